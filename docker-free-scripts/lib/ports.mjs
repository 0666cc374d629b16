import { createServer } from 'node:net';

/** Whether a server could listen on this loopback port now. */
export function portIsFree(port, host = '127.0.0.1') {
  return new Promise((resolve, reject) => {
    const probe = createServer();
    probe.once('error', (error) => (error.code === 'EADDRINUSE' ? resolve(false) : reject(error)));
    probe.listen({ port, host, exclusive: true }, () => probe.close(() => resolve(true)));
  });
}

/** A port nobody listens on at this moment. 5432 is left to whoever runs PostgreSQL for themselves. */
export async function freePort() {
  const port = await new Promise((resolve, reject) => {
    const probe = createServer();
    probe.once('error', reject);
    probe.listen(0, '127.0.0.1', () => {
      const chosen = probe.address().port;
      probe.close(() => resolve(chosen));
    });
  });
  return port === 5432 ? freePort() : port;
}

/** The remembered port if it can still be had, else a new one. */
export async function keepOrChoosePort(remembered) {
  return remembered && (await portIsFree(remembered)) ? remembered : freePort();
}
