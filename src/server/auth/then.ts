/** Where a person goes after signing in. */

const START = '/queue';

/**
 * The page that `?then=` names when it is one of ours, else the queue. Only an absolute path of this site counts: no
 * scheme, no host, no backslash that a browser would read as a slash, no control character it would drop.
 */
export function afterSignIn(then: string | null | undefined): string {
  if (!then || then.length > 500 || !/^\/(?!\/)[^\\\u0000-\u0020\u007f]*$/u.test(then))
    return START;
  const base = 'http://site.invalid';
  if (!URL.canParse(then, base)) return START;
  const { origin, pathname, search, hash } = new URL(then, base);
  // "/.//elsewhere" and the like become "//elsewhere" once the dots are gone.
  if (origin !== base || pathname.startsWith('//') || /^\/(api|sign-(in|out))(\/|$)/.test(pathname))
    return START;
  return pathname + search + hash;
}
