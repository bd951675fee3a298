import { StoreError } from './errors';

/** Percent-encoding of AWS Signature Version 4: all but A-Z a-z 0-9 - _ . ~ as upper-case UTF-8. */
export function encode(text: string): string {
  return encodeURIComponent(text).replace(
    /[!'()*]/g,
    (sign) => `%${sign.charCodeAt(0).toString(16).toUpperCase()}`,
  );
}

/** The same for a path, whose slashes stay. */
export const encodePath = (path: string): string => path.split('/').map(encode).join('/');

/** @throws StoreError InvalidURI when the percent-encoding is broken or is no UTF-8. */
export function decode(text: string): string {
  try {
    return decodeURIComponent(text);
  } catch {
    throw new StoreError('InvalidURI', 'The address is not well-formed percent-encoded UTF-8.');
  }
}
