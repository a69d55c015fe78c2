import { createServer } from 'node:net';

function listen(port) {
  return new Promise((resolve, reject) => {
    const server = createServer((socket) => socket.destroy());
    server.once('error', reject);
    server.listen({ port, host: '127.0.0.1', exclusive: true }, () => resolve(server));
  });
}

const close = (server) => new Promise((resolve) => server.close(resolve));

/** Keeps a port for somebody who starts later: nobody else gets it until it is released. Null where it is taken. */
export async function reservePort(port) {
  const server = await listen(port).catch(() => null);
  return server && { port: server.address().port, release: () => close(server) };
}

/** A port that nobody listens on at this moment: the wished one where possible. */
export async function freePort(wished) {
  const reserved = (wished && (await reservePort(wished))) || (await reservePort(0));
  await reserved.release();
  return reserved.port;
}
