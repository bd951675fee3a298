/** The theme a person chose, kept in a cookie so that the server can write it into the first byte of the page. */

export const THEMES = ['light', 'dark'] as const;
export type Theme = (typeof THEMES)[number];

/** The chosen theme, or null for "as the system" and for anything that is no theme. */
export function readTheme(cookie: string | undefined): Theme | null {
  return THEMES.find((theme) => theme === cookie) ?? null;
}
