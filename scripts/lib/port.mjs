import { createServer } from 'node:net';

/** A port on loopback that was free a moment ago. */
export function freePort() {
  return new Promise((resolve, reject) => {
    const server = createServer();
    server.on('error', reject);
    server.listen(0, '127.0.0.1', () => {
      const { port } = server.address();
      server.close(() => resolve(port));
    });
  });
}

/** Whether a port can be listened on; otherwise the code of the error. */
export function tryPort(port, host) {
  return new Promise((resolve) => {
    const server = createServer();
    server.on('error', (error) => resolve(error.code));
    server.listen(port, host, () => server.close(() => resolve(null)));
  });
}
