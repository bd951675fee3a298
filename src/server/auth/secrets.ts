import {
  createCipheriv,
  createDecipheriv,
  createHash,
  createHmac,
  hkdfSync,
  randomBytes,
  timingSafeEqual,
} from 'node:crypto';

const key = (secret: string, use: string) => Buffer.from(hkdfSync('sha256', secret, '', use, 32));

/** A random secret for an address or a cookie: 256 bits, URL-safe. */
export const newSecret = (): string => randomBytes(32).toString('base64url');

/** An unguessable public id of 22 characters (128 bits). */
export const newPublicId = (): string => randomBytes(16).toString('base64url');

/** How a high-entropy secret is kept: SHA-256, hex. */
export const hashSecret = (secret: string): string =>
  createHash('sha256').update(secret).digest('hex');

/** Letters and digits that cannot be misread on a receipt. */
const CLAIM_LETTERS = '23456789ABCDEFGHJKMNPQRSTVWXYZ';

/** A claim code such as `K7Q4-9WMT-2X`: 10 characters of 30, about 49 bits; guessing is rate-limited. */
export function newClaimCode(): string {
  let code = '';
  while (code.length < 10) {
    for (const byte of randomBytes(16)) {
      // 240 = 8 × 30: bytes above it would favour the first letters
      if (byte < 240 && code.length < 10) code += CLAIM_LETTERS[byte % 30];
    }
  }
  return `${code.slice(0, 4)}-${code.slice(4, 8)}-${code.slice(8)}`;
}

/** Claim codes are short, so their hash is keyed with the app secret and bound to the ticket. */
export function hashClaimCode(secret: string, ticketNumber: string, code: string): string {
  const plain = code.toUpperCase().replace(/[^0-9A-Z]/g, '');
  return createHmac('sha256', key(secret, 'claim'))
    .update(`${ticketNumber}:${plain}`)
    .digest('hex');
}

export const sameHash = (a: string, b: string): boolean =>
  a.length === b.length && timingSafeEqual(Buffer.from(a), Buffer.from(b));

/** Encrypts a text at rest (AES-256-GCM under a key derived for `use`). */
export function seal(secret: string, use: string, text: string): string {
  const iv = randomBytes(12);
  const cipher = createCipheriv('aes-256-gcm', key(secret, use), iv);
  const body = Buffer.concat([cipher.update(text, 'utf8'), cipher.final()]);
  return Buffer.concat([iv, cipher.getAuthTag(), body]).toString('base64url');
}

/** The text again, or null when it was not sealed here or was changed. */
export function unseal(secret: string, use: string, sealed: string): string | null {
  try {
    const raw = Buffer.from(sealed, 'base64url');
    const decipher = createDecipheriv('aes-256-gcm', key(secret, use), raw.subarray(0, 12));
    decipher.setAuthTag(raw.subarray(12, 28));
    return Buffer.concat([decipher.update(raw.subarray(28)), decipher.final()]).toString('utf8');
  } catch {
    return null;
  }
}
