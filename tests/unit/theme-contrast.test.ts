import { readFileSync, readdirSync } from 'node:fs';
import { fileURLToPath } from 'node:url';
import { describe, expect, it } from 'vitest';

const src = fileURLToPath(new URL('../../src/', import.meta.url));
const css = readFileSync(`${src}styles/theme.css`, 'utf8');

const roles = new Map(
  [...css.matchAll(/--color-([a-z-]+):\s*light-dark\((#[0-9a-f]{6}),\s*(#[0-9a-f]{6})\)/g)].map(
    ([, role, light, dark]) => [role!, { light: light!, dark: dark! }] as const,
  ),
);

/** WCAG 2.2, definition of relative luminance (sRGB). */
function luminance(hex: string): number {
  const [r, g, b] = [1, 3, 5].map((at) => {
    const c = parseInt(hex.slice(at, at + 2), 16) / 255;
    return c <= 0.04045 ? c / 12.92 : ((c + 0.055) / 1.055) ** 2.4;
  });
  return 0.2126 * r! + 0.7152 * g! + 0.0722 * b!;
}

function contrast(a: string, b: string): number {
  const [high, low] = [luminance(a), luminance(b)].sort((x, y) => y - x);
  return (high! + 0.05) / (low! + 0.05);
}

const surfaces = ['mat', 'sheet', 'well'];
const washes = ['copper-wash', 'carmine-wash', 'amber-wash', 'bottle-wash'];
const grounds = [...surfaces, ...washes];

/** Print → the grounds it may stand on. WCAG 2.2, 1.4.3: 4.5:1 for text. */
const TEXT: Record<string, string[]> = {
  ink: grounds,
  'ink-soft': grounds,
  copper: grounds,
  'copper-deep': grounds,
  carmine: grounds,
  amber: grounds,
  bottle: grounds,
  // Filled buttons, the selection, and a framed button under the pointer.
  'on-copper': ['copper', 'copper-deep'],
  'on-carmine': ['carmine'],
  sheet: ['ink'],
};

/** WCAG 2.2, 1.4.11: 3:1 for what bounds a control or tells a drawing's parts apart. */
const BOUNDS: Record<string, string[]> = { edge: grounds, focus: grounds };

describe.each(['light', 'dark'] as const)('the %s theme', (theme) => {
  const colour = (role: string) => {
    const found = roles.get(role);
    if (!found) throw new Error(`theme.css has no role ${role}`);
    return found[theme];
  };
  const pairs = (table: Record<string, string[]>) =>
    Object.entries(table).flatMap(([print, on]) => on.map((ground) => [print, ground] as const));

  it.each(pairs(TEXT))('prints %s on %s at 4.5:1 or better', (print, ground) => {
    expect(contrast(colour(print), colour(ground))).toBeGreaterThanOrEqual(4.5);
  });

  it.each(pairs(BOUNDS))('bounds with %s on %s at 3:1 or better', (print, ground) => {
    expect(contrast(colour(print), colour(ground))).toBeGreaterThanOrEqual(3);
  });
});

describe('the roles', () => {
  it('measures contrast as the standard does: black on white is 21:1', () => {
    expect(contrast('#000000', '#ffffff')).toBeCloseTo(21, 10);
    // #767676 is the lightest grey that passes on white (W3C, Understanding SC 1.4.3, from memory).
    expect(contrast('#767676', '#ffffff')).toBeCloseTo(4.54, 2);
  });

  it('are all checked, except the hairline that only decorates', () => {
    const used = new Set(
      [TEXT, BOUNDS].flatMap((t) => [...Object.keys(t), ...Object.values(t).flat()]),
    );
    expect([...roles.keys()].filter((role) => !used.has(role))).toEqual(['rule']);
  });

  it('are the only colours: no raw one stands outside theme.css', () => {
    const areas = ['styles', 'layouts', 'components', 'islands', 'pages'];
    const files = areas.flatMap((area) =>
      readdirSync(`${src}${area}`, { recursive: true, encoding: 'utf8' })
        .filter((file) => /\.(css|astro|tsx)$/.test(file))
        .map((file) => `${area}/${file}`),
    );
    const raw = files
      .filter((file) => file !== 'styles/theme.css')
      .filter((file) =>
        /[\s:'"(](#([0-9a-f]{3}|[0-9a-f]{6}|[0-9a-f]{8})|(rgba?|hsla?|oklch)\([^)]*\))(?![\w-])/i.test(
          readFileSync(src + file, 'utf8'),
        ),
      );
    expect(files.length).toBeGreaterThan(20);
    expect(raw).toEqual([]);
  });
});
