import { InvalidError, MalformedError, TooLargeError, WrongTypeError } from '../errors';
import type { Operation, UploadedFile } from './operation';

export const MAX_JSON_BYTES = 1024 * 1024;
export const MAX_UPLOAD_BYTES = 10 * 1024 * 1024;

/** Reads a request's body within its limit: JSON, or a form with one file. */
export async function readBody(
  operation: Operation,
  request: Request,
): Promise<{ body: unknown; file?: UploadedFile }> {
  if (operation.method === 'GET' || operation.method === 'DELETE') return { body: {} };
  const type = request.headers.get('content-type')?.split(';')[0]?.trim().toLowerCase() ?? '';
  if (operation.upload) return readForm(request, type);
  const bytes = await readBytes(request, MAX_JSON_BYTES, '1 MB');
  if (bytes.length === 0) return { body: {} };
  if (type !== 'application/json') throw new WrongTypeError('Send JSON, with the content type application/json.');
  try {
    return { body: JSON.parse(new TextDecoder('utf-8', { fatal: true }).decode(bytes)) };
  } catch {
    throw new MalformedError('The body is not readable as JSON in UTF-8.');
  }
}

async function readForm(request: Request, type: string): Promise<{ body: unknown; file: UploadedFile }> {
  if (type !== 'multipart/form-data') throw new WrongTypeError('Send the file in a form (multipart/form-data).');
  const bytes = await readBytes(request, MAX_UPLOAD_BYTES + 64 * 1024, '10 MB');
  let form: FormData;
  try {
    form = await new Response(bytes as BodyInit, {
      headers: { 'content-type': request.headers.get('content-type')! },
    }).formData();
  } catch {
    throw new MalformedError('The form could not be read.');
  }
  const file = form.get('file');
  if (!(file instanceof File)) throw new InvalidError([{ pointer: '/file', detail: 'Choose a file.' }]);
  if (file.size > MAX_UPLOAD_BYTES)
    throw new TooLargeError('The file is larger than 10 MB. Send the listing without columns that are not needed.');
  const fields = [...form.entries()].filter(([, value]) => typeof value === 'string');
  return {
    body: Object.fromEntries(fields),
    file: { name: safeName(file.name), bytes: new Uint8Array(await file.arrayBuffer()) },
  };
}

/** The last part of the name only, printable: it is shown and stored, never used as a path. */
function safeName(name: string): string {
  return (name.split(/[\\/]/).at(-1) ?? '').replace(/[^\p{L}\p{N} ._()-]/gu, '_').slice(0, 200) || 'file';
}

async function readBytes(request: Request, limit: number, words: string): Promise<Uint8Array> {
  const declared = Number(request.headers.get('content-length') ?? 0);
  if (declared > limit) throw new TooLargeError(`The request is larger than ${words}.`);
  if (!request.body) return new Uint8Array();
  const chunks: Uint8Array[] = [];
  let size = 0;
  for await (const chunk of request.body as unknown as AsyncIterable<Uint8Array>) {
    size += chunk.length;
    if (size > limit) throw new TooLargeError(`The request is larger than ${words}.`);
    chunks.push(chunk);
  }
  return Buffer.concat(chunks);
}
