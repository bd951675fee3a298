/** Text in which no line breaks between a number and its unit. */
export const glued = (text: string): string =>
  text.replace(/(\d) (?=[pnµmkMGT]?(?:Ω|V|A|W|F|%)(?![A-Za-z]))/g, '$1\u00a0');
