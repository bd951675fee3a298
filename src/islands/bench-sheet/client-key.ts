/** A new UUID. `randomUUID` is there on secure addresses only; a shop's own network may not be one. */
export function newClientKey(): string {
  if (typeof crypto.randomUUID === 'function') return crypto.randomUUID();
  const bytes = crypto.getRandomValues(new Uint8Array(16));
  // Version 4, variant 1 (RFC 9562, 5.4).
  bytes[6] = ((bytes[6] ?? 0) & 0x0f) | 0x40;
  bytes[8] = ((bytes[8] ?? 0) & 0x3f) | 0x80;
  const hex = Array.from(bytes, (byte) => byte.toString(16).padStart(2, '0')).join('');
  return [8, 12, 16, 20, 32]
    .map((end, i, ends) => hex.slice(i === 0 ? 0 : ends[i - 1], end))
    .join('-');
}
