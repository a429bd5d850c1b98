// Stands in the worker's place, to find out what a confined process can reach. Each attempt answers "reached" or why not.
import { execFileSync } from 'node:child_process';
import { readdirSync, readFileSync, writeFileSync } from 'node:fs';
import { connect } from 'node:net';
import { Worker } from 'node:worker_threads';

const tried = (attempt) => {
  try {
    attempt();
    return 'reached';
  } catch (error) {
    return error.code ?? error.name;
  }
};

const connection = (port, host) =>
  new Promise((resolve) => {
    const socket = connect({ port, host, timeout: 2000 });
    socket.on('connect', () => resolve('reached'));
    socket.on('error', (error) => resolve(error.code));
    socket.on('timeout', () => resolve('timeout'));
  });

async function attempts({ port, buffers = 40 }) {
  return {
    loopback: await connection(port, '127.0.0.1'),
    loopback6: await connection(port, '::1'),
    outside: await connection(53, '9.9.9.9'),
    accounts: tried(() => readFileSync('/etc/passwd')),
    environment: tried(() => readFileSync('/proc/self/environ')),
    otherEnvironment: tried(() => readFileSync(`/proc/${process.ppid}/environ`)),
    folder: tried(() => readdirSync('/')),
    here: tried(() => writeFileSync('here.txt', 'x')),
    elsewhere: tried(() => writeFileSync('/tmp/stillroom-probe.txt', 'x')),
    program: tried(() => execFileSync('/bin/true')),
    thread: tried(() => new Worker('1', { eval: true })),
    source: tried(() => new Function('return 1')()),
    host: tried(() => process.kill(process.ppid, 0)),
    root: process.getuid() === 0 ? 'reached' : 'EPERM',
    buffers: tried(() => Array.from({ length: buffers }, () => new Float64Array(2 ** 24).fill(1))),
    secret: process.env.SECRET === undefined ? 'absent' : 'reached',
  };
}

process.on('message', (message) => {
  if (message.type === 'run') {
    void attempts(message.job.settings).then((result) =>
      process.send({
        type: 'done',
        run: message.run,
        last: false,
        outcome: { status: 'ok', result, resultDigest: '', warnings: [], keep: false },
      }),
    );
  }
});
process.send({ type: 'ready' });
