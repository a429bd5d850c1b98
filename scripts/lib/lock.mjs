import { spawn } from 'node:child_process';
import { Complaint } from './words.mjs';

/**
 * Takes a lock on a file that the system frees when we end, however we end.
 * @param {string} file
 * @param {{ shared?: boolean, wait?: number }} options `wait` in seconds; 0 asks once.
 * @returns {Promise<{ release(): Promise<void> } | null>} null where somebody else keeps it.
 */
export function takeLock(file, { shared = false, wait = 0 } = {}) {
  const how = [shared ? '-s' : '-x', ...(wait > 0 ? ['-w', String(wait)] : ['-n'])];
  // The child holds the lock until its standard input closes: when we let go, or when we are gone.
  const child = spawn('flock', [...how, file, '-c', 'echo locked; exec cat >/dev/null'], {
    stdio: ['pipe', 'pipe', 'inherit'],
    // Ctrl-C reaches every process of the terminal's group; the lock must outlive our own ending.
    detached: true,
  });
  return new Promise((resolve, reject) => {
    child.on('error', (error) =>
      reject(
        error.code === 'ENOENT'
          ? new Complaint('The program flock is missing; install the package util-linux, then start again.')
          : error,
      ),
    );
    child.stdout.once('data', () => {
      child.unref();
      child.stdin.unref?.();
      child.stdout.unref?.();
      resolve({ release: () => endOf(child) });
    });
    child.on('close', (status) => status !== 0 && resolve(null));
  });
}

function endOf(child) {
  return new Promise((resolve) => {
    if (child.exitCode !== null) return resolve();
    child.ref();
    child.on('close', () => resolve());
    child.stdin.end();
  });
}
