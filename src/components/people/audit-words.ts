/** How the audit log's entries are written on screen. */

const plain = (value: unknown): string =>
  value === null || value === undefined
    ? 'none'
    : value === true
      ? 'on'
      : value === false
        ? 'off'
        : typeof value === 'string'
          ? value || '(empty)'
          : Array.isArray(value)
            ? value.map(plain).join(', ')
            : typeof value === 'object'
              ? Object.entries(value)
                  .map(([name, inner]) => `${name} ${plain(inner)}`)
                  .join(', ')
              : String(value);

/** A line's detail in words: `{ from, to }` as "from → to", everything else by name. */
export function detailLines(detail: Readonly<Record<string, unknown>>): string[] {
  const { from, to, ...rest } = detail;
  const change = 'from' in detail && 'to' in detail ? [`${plain(from)} → ${plain(to)}`] : [];
  const others = change.length > 0 ? rest : detail;
  return [...change, ...Object.entries(others).map(([name, value]) => `${name}: ${plain(value)}`)];
}

const PLACES: Readonly<Record<string, string>> = {
  person: '/people/',
  ticket: '/tickets/',
  fault: '/faults/',
  board: '/boards/',
};

/** The page of the thing a line is about, or null when it has none. */
export function objectAddress(object: string): string | null {
  const [kind = '', key = ''] = object.split(':');
  const place = PLACES[kind];
  return place && /^[\w-]+$/.test(key) ? place + key : null;
}
