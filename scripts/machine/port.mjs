import { createServer } from 'node:net';

function listen(port) {
  return new Promise((resolve, reject) => {
    const server = createServer();
    server.once('error', reject);
    server.listen({ port, host: '127.0.0.1', exclusive: true }, () => {
      const taken = server.address().port;
      server.close(() => resolve(taken));
    });
  });
}

export async function isFree(port) {
  return listen(port).then(
    () => true,
    () => false,
  );
}

/** A port that nobody listens on at this moment: the wished one where possible. */
export async function freePort(wished) {
  return wished && (await isFree(wished)) ? wished : listen(0);
}
