import { createHash } from 'node:crypto';
import { CreateBucketCommand, GetObjectCommand, PutObjectCommand, S3Client } from '@aws-sdk/client-s3';
import { env } from './env';

export interface StoredFile {
  key: string;
  sha256: string;
  size: number;
}

let client: S3Client | undefined;

/** Any S3-compatible store: addressed by path, and without the checksum trailers that not all of them know. */
function connect(): S3Client {
  const { endpoint, region, accessKey, secretKey } = env().storage;
  if (!endpoint) throw new Error('S3_ENDPOINT is not set: there is no file store.');
  client ??= new S3Client({
    endpoint,
    region,
    forcePathStyle: true,
    credentials: { accessKeyId: accessKey, secretAccessKey: secretKey },
    requestChecksumCalculation: 'WHEN_REQUIRED',
    responseChecksumValidation: 'WHEN_REQUIRED',
    requestHandler: { connectionTimeout: 5_000, requestTimeout: 30_000 },
  });
  return client;
}

const digest = (body: Uint8Array): string => createHash('sha256').update(body).digest('hex');
const isNamed = (error: unknown, ...names: string[]): boolean => error instanceof Error && names.includes(error.name);

/** Keeps a file under a key, with its SHA-256 beside it. The bucket is made when it is missing. */
export async function putFile(key: string, body: Uint8Array, contentType: string): Promise<StoredFile> {
  const { bucket } = env().storage;
  const sha256 = digest(body);
  const put = () =>
    connect().send(
      new PutObjectCommand({ Bucket: bucket, Key: key, Body: body, ContentType: contentType, Metadata: { sha256 } }),
    );
  try {
    await put();
  } catch (error) {
    if (!isNamed(error, 'NoSuchBucket')) throw error;
    await makeBucket(bucket);
    await put();
  }
  return { key, sha256, size: body.byteLength };
}

async function makeBucket(bucket: string): Promise<void> {
  try {
    await connect().send(new CreateBucketCommand({ Bucket: bucket }));
  } catch (error) {
    // Somebody else was faster, which is as good.
    if (!isNamed(error, 'BucketAlreadyOwnedByYou', 'BucketAlreadyExists')) throw error;
  }
}

/** The file's bytes, which are what was stored or an error: the SHA-256 that the database remembers is compared. */
export async function getFile(key: string, sha256: string): Promise<Uint8Array> {
  const { bucket } = env().storage;
  const reply = await connect().send(new GetObjectCommand({ Bucket: bucket, Key: key }));
  if (!reply.Body) throw new Error(`File ${key}: the store sent nothing.`);
  const body = await reply.Body.transformToByteArray();
  if (digest(body) !== sha256) throw new Error(`File ${key}: its SHA-256 is not the one that was recorded.`);
  return body;
}
