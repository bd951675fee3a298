/** Attributes that are texts, kept as `data-…` when nodes travel through the clipboard or are dragged. */
export const wordAttributes = (names: readonly string[]) =>
  Object.fromEntries(
    names.map((name) => [
      name,
      {
        default: '',
        parseHTML: (element: HTMLElement) => element.getAttribute(`data-${name}`) ?? '',
        renderHTML: (attributes: Record<string, unknown>) => ({
          [`data-${name}`]: attributes[name] === null ? '' : String(attributes[name]),
        }),
      },
    ]),
  );
