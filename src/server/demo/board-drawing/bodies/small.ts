/** Parts soldered on the surface, and the fillets of solder that hold them. */
import { num } from '../geometry';
import { lettered } from '../lettering';
import { BAND_PAINTS } from '../markings';
import { lit } from '../paint';
import type { Body } from '../types';
import { circle, ellipse, line, path, rect, rectPath, TIN, type Brush, type Shade } from './brush';

type Chip = Extract<Body, { look: 'chip-resistor' | 'chip-capacitor' }>;
type Melf = Extract<Body, { look: 'melf' }>;
type Sot = Extract<Body, { look: 'sot23' }>;

/** Solder that climbs the end of a part: dark at the foot, bright half-way up. */
function fillet(brush: Brush, x: number, width: number, reach: number): string {
  const out = Math.sign(x);
  const shape = `M${num(x)} ${num(-width / 2)}L${num(x + out * reach * 0.75)} ${num(-width * 0.46)}Q${num(x + out * reach)} ${num(-width * 0.4)} ${num(x + out * reach)} 0Q${num(x + out * reach)} ${num(width * 0.4)} ${num(x + out * reach * 0.75)} ${num(width * 0.46)}L${num(x)} ${num(width / 2)}z`;
  const shine = x + out * reach * 0.5;
  return (
    path(shape, brush.paints.plane('#8d9192', brush.turn + (out < 0 ? 0 : 180), 0.3)) +
    ellipse(shine, 0, reach * 0.16, width * 0.3, '#ffffff', 'fill-opacity=".42"')
  );
}

export function drawChip(chip: Chip, brush: Brush): string {
  const { length, width } = chip;
  const end = length * 0.17;
  const inner = length - end * 2;
  const metal = brush.paints.plane('#c3c5c4', brush.turn, 0.16);
  const ends = [-1, 1]
    .map((side) => rect(side < 0 ? -length / 2 : length / 2 - end, -width / 2, end, width, metal))
    .join('');
  const fillets =
    fillet(brush, -length / 2, width, length * 0.17) +
    fillet(brush, length / 2, width, length * 0.17);
  if (chip.look === 'chip-capacitor')
    return [
      fillets,
      rect(
        -length / 2,
        -width / 2,
        length,
        width,
        brush.paints.plane(chip.colour, brush.turn, 0.16),
        'rx=".1"',
      ),
      ends,
      rect(-inner / 2, -width / 2, inner, width * 0.14, '#ffffff', 'fill-opacity=".3"'),
    ].join('');
  const dark = brush.wear === 'baked' || brush.wear === 'cracked' ? '#2a1d14' : '#1d1e20';
  return [
    fillets,
    rect(-length / 2, -width / 2, length, width, '#d9d7cf', 'rx=".06"'),
    ends,
    rect(
      -inner / 2,
      -width * 0.44,
      inner,
      width * 0.88,
      brush.paints.plane(dark, brush.turn, 0.25),
    ),
    lettered(chip.code, {
      x: 0,
      y: 0,
      height: width * 0.46,
      colour: '#e8e8e2',
      stretch: chip.code.length > 3 ? 0.74 : 0.95,
    }),
    brush.wear === 'cracked'
      ? line(
          `M${num(-inner * 0.1)} ${num(-width / 2)}L${num(inner * 0.08)} 0L${num(-inner * 0.02)} ${num(width / 2)}`,
          '#cbb9a0',
          0.1,
        )
      : '',
  ].join('');
}

export const chipShade = ({ length, width }: Chip): Shade[] => [
  { path: rectPath(-length / 2, -width / 2, length, width), tall: 0.6 },
];

/** Cylinders without leads: resistors with bands, glass diodes. */
export function drawMelf(melf: Melf, brush: Brush): string {
  const { length, diameter, colour, bands } = melf;
  const r = diameter / 2;
  const end = length * 0.14;
  const round = (paint: string, gloss = 0.7) =>
    brush.paints.cylinder({ colour: paint, gloss, spread: 0.2 }, brush.turn, r);
  const inner = length - end * 2;
  const diode = bands.length === 1;
  const rings = diode
    ? rect(-inner / 2 + inner * 0.06, -r * 0.94, inner * 0.2, diameter * 0.94, round('#161514'))
    : bands
        .map((name, i) => {
          const x = -inner / 2 + inner * (0.1 + (i / (bands.length - 1)) * 0.8);
          return rect(
            x - inner * 0.055,
            -r * 0.94,
            inner * 0.11,
            diameter * 0.94,
            round(BAND_PAINTS[name] ?? '#888888'),
          );
        })
        .join('');
  const metal = brush.paints.cylinder(TIN, brush.turn, r);
  return [
    fillet(brush, -length / 2, diameter * 1.05, length * 0.13),
    fillet(brush, length / 2, diameter * 1.05, length * 0.13),
    rect(-length / 2, -r, end + 0.1, diameter, metal, 'rx=".15"'),
    rect(length / 2 - end - 0.1, -r, end + 0.1, diameter, metal, 'rx=".15"'),
    rect(-inner / 2, -r * 0.94, inner, diameter * 0.94, round(colour, 0.9)),
    diode
      ? rect(-inner * 0.12, -r * 0.4, inner * 0.36, r * 0.8, '#3d1d12', 'fill-opacity=".6"')
      : '',
    rings,
    brush.wear === 'cracked' || brush.wear === 'burnt'
      ? ellipse(0, 0, length * 0.4, r * 1.1, brush.paints.patch('#120c08', 0.9, 0.2))
      : '',
  ].join('');
}

export const melfShade = ({ length, diameter }: Melf): Shade[] => [
  { path: rectPath(-length / 2, -diameter / 2, length, diameter), tall: diameter * 0.8 },
];

export function drawSot({ code }: Sot, brush: Brush): string {
  const legs = [
    [-0.95, 1],
    [0.95, 1],
    [0, -1],
  ] as const;
  const metal = brush.paints.plane('#b7babb', brush.turn, 0.25);
  const feet = legs
    .map(([x, side]) => {
      const y = side > 0 ? 0.55 : -1.35;
      return (
        rect(x - 0.22, y, 0.44, 0.8, metal) +
        rect(x - 0.2, side > 0 ? 1.02 : -1.3, 0.4, 0.12, '#ffffff', 'fill-opacity=".55"')
      );
    })
    .join('');
  const crater =
    brush.wear === 'split' || brush.wear === 'burnt'
      ? circle(0.1, 0, 0.55, brush.paints.patch('#c9bfae', 0.9)) +
        circle(0.12, 0.03, 0.27, '#0a0908') +
        path('M.1-.1L.9-.55M.1 0L-.8.4', 'none', 'stroke="#0a0908" stroke-width=".09"')
      : '';
  return [
    feet,
    rect(-1.48, -0.68, 2.96, 1.36, brush.paints.plane('#27282b', brush.turn, 0.3), 'rx=".08"'),
    rect(-1.3, -0.5, 2.6, 1, lit('#27282b', 1.1), 'rx=".05"'),
    lettered(code, { x: 0, y: 0, height: 0.62, colour: '#b9bcbd', opacity: 0.8 }),
    crater,
  ].join('');
}

export const sotShade: Shade[] = [{ path: rectPath(-1.5, -0.7, 3, 1.4), tall: 1 }];
