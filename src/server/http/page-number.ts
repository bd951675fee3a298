/** The page of a list that `?page=` names: from 1; anything else is the first. */
export function pageNumber(text: string | null | undefined): number {
  const page = /^\d{1,5}$/.test(text ?? '') ? Number(text) : 1;
  return Math.max(1, page);
}

/** The page asked for, or the last one where the list is shorter than that. */
export const pageWithin = (page: number, total: number, size: number): number =>
  Math.min(page, Math.max(1, Math.ceil(total / size)));

/** Reads the page that `?page=` names, or the last one where the list is shorter than that. */
export async function shownPage<T>(
  text: string | null | undefined,
  size: number,
  read: (limit: number, offset: number) => Promise<{ rows: T[]; total: number }>,
): Promise<{ page: number; rows: T[]; total: number }> {
  const asked = pageNumber(text);
  const found = await read(size, (asked - 1) * size);
  const page = pageWithin(asked, found.total, size);
  return page === asked ? { page, ...found } : { page, ...(await read(size, (page - 1) * size)) };
}
