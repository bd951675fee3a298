import { done, refuse, type Outcome } from '../refusal';

/** Reads at most `limit` bytes; a longer body is refused without being held. */
export async function readBytes(request: Request, limit: number): Promise<Outcome<Uint8Array>> {
  const tooLarge = refuse('too-large', `The body is over ${limit} bytes: send less.`);
  const declared = Number(request.headers.get('content-length') ?? 0);
  if (declared > limit) return tooLarge;
  if (!request.body) return done(new Uint8Array());
  const chunks: Uint8Array[] = [];
  let size = 0;
  const reader = request.body.getReader();
  try {
    for (;;) {
      const { done: end, value } = await reader.read();
      if (end) break;
      size += value.byteLength;
      if (size > limit) {
        await reader.cancel();
        return tooLarge;
      }
      chunks.push(value);
    }
  } catch {
    return refuse('bad-request', 'The body broke off: send it again.');
  }
  return done(Buffer.concat(chunks));
}

/** Reads a JSON body. */
export async function readJson(request: Request, limit: number): Promise<Outcome<unknown>> {
  const type = request.headers.get('content-type')?.split(';')[0]?.trim().toLowerCase();
  if (type !== 'application/json')
    return refuse(
      'wrong-media',
      `${type || 'No content type'} was given: application/json is needed.`,
    );
  const bytes = await readBytes(request, limit);
  if (!bytes.ok) return bytes;
  try {
    const text = new TextDecoder('utf-8', { fatal: true }).decode(bytes.value);
    return done(JSON.parse(text) as unknown);
  } catch {
    return refuse('bad-request', 'The body is not JSON.', {
      errors: [{ path: '', message: 'JSON in UTF-8 is needed.' }],
    });
  }
}

/** Reads an HTML form (urlencoded or multipart without large files). */
export async function readForm(request: Request, limit = 262_144): Promise<Outcome<FormData>> {
  const type = request.headers.get('content-type') ?? '';
  if (!/^(application\/x-www-form-urlencoded|multipart\/form-data)/i.test(type))
    return refuse('wrong-media', 'A form is needed.');
  const bytes = await readBytes(request, limit);
  if (!bytes.ok) return bytes;
  try {
    const copy = new Response(bytes.value as BodyInit, { headers: { 'content-type': type } });
    return done(await copy.formData());
  } catch {
    return refuse('bad-request', 'The form cannot be read: send it again.');
  }
}
