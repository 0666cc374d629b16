import { createServer } from 'node:http';

export interface HealthServer {
  close(): Promise<void>;
}

/** Answers `GET /health` on loopback with 200 while the runner works and 503 once it has ended. */
export async function healthServer(port: number, ended: Promise<void>): Promise<HealthServer> {
  let alive = true;
  const over = (): void => { alive = false; };
  ended.then(over, over);
  const server = createServer((request, response) => {
    const known = request.method === 'GET' && request.url === '/health';
    response.writeHead(known ? (alive ? 200 : 503) : 404, { 'content-type': 'application/json' });
    response.end(JSON.stringify({ status: known && alive ? 'ok' : 'unavailable' }));
  });
  await new Promise<void>((resolve, reject) => {
    server.once('error', reject);
    server.listen(port, '127.0.0.1', resolve);
  });
  return { close: () => new Promise((resolve) => { server.close(() => resolve()); server.closeAllConnections(); }) };
}
