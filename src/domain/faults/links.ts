/** True for web and mail addresses and for paths of this site: what a link in a note may lead to. */
export function isSafeLink(href: string): boolean {
  if (/[\s\\\p{Cc}\p{Cf}]/u.test(href)) return false;
  if (/^\/(?!\/)/.test(href)) return true;
  if (!/^(https?:\/\/|mailto:)/i.test(href)) return false;
  try {
    const { protocol, username, password } = new URL(href);
    return ['https:', 'http:', 'mailto:'].includes(protocol) && username === '' && password === '';
  } catch {
    return false;
  }
}
