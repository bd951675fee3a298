/** Addresses of a list's other states: the same search and filters, another page or order. */

/** The path and query of `url` with one parameter set, or dropped when the value is null. */
export function withParameter(url: URL, name: string, value: string | null): string {
  const query = new URLSearchParams(url.search);
  if (value === null) query.delete(name);
  else query.set(name, value);
  const text = query.toString();
  return text ? `${url.pathname}?${text}` : url.pathname;
}

/**
 * Where a column head leads: the order `column`, or `-column` when it is sorted by it upwards already.
 * The page goes back to the first.
 */
export function sortAddress(url: URL, column: string, inForce: string): string {
  const next = inForce === column ? `-${column}` : column;
  const first = new URL(url);
  first.searchParams.delete('page');
  return withParameter(first, 'sort', next);
}

/** The page numbers a pager shows: the first, the last, the current and its neighbours; null for a gap. */
export function pagesShown(current: number, last: number): (number | null)[] {
  const wanted = new Set([1, 2, current - 1, current, current + 1, last - 1, last]);
  const pages = [...wanted].filter((page) => page >= 1 && page <= last).sort((a, b) => a - b);
  return pages.flatMap((page, i) => {
    const gap = page - (pages[i - 1] ?? page - 1);
    return gap === 1 ? [page] : gap === 2 ? [page - 1, page] : [null, page];
  });
}
