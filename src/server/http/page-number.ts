/** The page of a list that `?page=` names: from 1; anything else is the first. */
export function pageNumber(text: string | null | undefined): number {
  const page = /^\d{1,5}$/.test(text ?? '') ? Number(text) : 1;
  return Math.max(1, page);
}
