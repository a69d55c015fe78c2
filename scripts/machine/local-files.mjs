import S3rver from 's3rver';
import account from 's3rver/lib/models/account.js';

/** A file store that speaks S3 over a folder, on loopback, for one pair of keys made on this machine. */
const { S3_ACCESS_KEY, S3_SECRET_KEY, KALENDS_FILES_FOLDER } = process.env;

account.DUMMY_ACCOUNT.revokeAccessKey('S3RVER');
account.DUMMY_ACCOUNT.createKeyPair(S3_ACCESS_KEY, S3_SECRET_KEY);

const server = new S3rver({
  address: '127.0.0.1',
  port: 0,
  silent: true,
  directory: KALENDS_FILES_FOLDER,
  vhostBuckets: false,
});
// It lets anybody read who sends no signature at all; uploads are for nobody else on this machine.
server.middleware.unshift(async (context, next) => {
  if (context.get('authorization')) return next();
  context.status = 403;
  return undefined;
});

const { port } = await server.run();
process.send?.({ port });
