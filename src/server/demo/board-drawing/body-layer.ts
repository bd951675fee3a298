/** The parts on the board, the low ones first, with the soot or the flux round those that were hurt or replaced. */
import { chanceFrom, type Chance } from '../chance';
import { at, num, plus, polyline, turned, type Point } from './geometry';
import { chanceOf, brushFor, type Scene } from './scene';
import { circle, ellipse, moved } from './bodies/brush';
import { DISC_RISE } from './bodies/disc';
import { drawBody, shadeOf } from './bodies/draw';
import { transistorFoot } from './bodies/heatsink';
import { padsOf } from './footprint';
import { LAMP } from './paint';
import type { Part } from './types';

const SOOTY = new Set(['burnt', 'split', 'blown', 'cracked']);

/** Where the body of a part is: a disc lies beside its leads, a transistor at the foot of its heatsink. */
export function bodyMiddle({ body, at: p, turn }: Part): Point {
  if (body.look === 'disc') return plus(p, turned(at(0, DISC_RISE), turn));
  if (body.look === 'heatsink') return plus(p, turned(at(0, transistorFoot(body.height)), turn));
  return p;
}

/** Smoke on the board round a part that burnt, blown away from it to one side. */
function soot(scene: Scene, part: Part, strength: number): string {
  const chance = chanceOf(part);
  const { x, y } = bodyMiddle(part);
  const size = Math.max(4, Math.min(part.width, part.height) * 0.8);
  const drift = turned(at(size * 0.55, 0), chance.between(0, 360));
  const clouds = Array.from({ length: 9 }, (_, i) => {
    const share = i / 8;
    const px = x + drift.x * share * 1.6 + chance.between(-size, size) * 0.35;
    const py = y + drift.y * share * 1.6 + chance.between(-size, size) * 0.35;
    const r = size * chance.between(0.45, 0.95);
    return ellipse(px, py, r * 1.15, r, scene.paints.patch('#0d0906', 0.5 * strength, 0.08));
  });
  const specks = Array.from({ length: 26 }, () => {
    const p = turned(at(size * chance.between(0.7, 2.1), 0), chance.between(0, 360));
    return circle(x + p.x, y + p.y, chance.between(0.05, 0.22), '#100c09', 'fill-opacity=".75"');
  });
  return [...clouds, ...specks].join('');
}

/** What a soldering iron leaves: a thin amber film round fresh joints. */
function flux(scene: Scene, part: Part): string {
  return padsOf(part)
    .map(({ at: p, width }) => {
      const q = scene.face.flip(p);
      const r = width * 0.9 + 0.9;
      return (
        ellipse(q.x, q.y, r * 1.25, r, scene.paints.patch('#c58a2a', 0.42, 0.35)) +
        ellipse(
          q.x - r * 0.4,
          q.y - r * 0.4,
          r * 0.4,
          r * 0.2,
          scene.paints.patch('#fff4d8', 0.4),
          `transform="rotate(-35 ${num(q.x - r * 0.4)} ${num(q.y - r * 0.4)})"`,
        )
      );
    })
    .join('');
}

/** Dust, lint and a smear or two: no board comes to a bench without. */
function dust({ face, paints, frame }: Scene): string {
  const chance = chanceFrom(Math.round(frame.middle.x * 1000 + frame.scale * 10));
  const spot = () => at(chance.between(0, face.width), chance.between(0, face.height));
  const specks = Array.from({ length: 90 }, () => {
    const { x, y } = spot();
    const pale = chance.next() < 0.7;
    return circle(
      x,
      y,
      chance.between(0.03, 0.09),
      pale ? '#dfe3da' : '#14120f',
      `fill-opacity="${num(chance.between(0.15, 0.5))}"`,
    );
  });
  const lint = Array.from({ length: 7 }, () => {
    const { x, y } = spot();
    const [a, b] = [spotNear(chance, 2.2), spotNear(chance, 3.4)];
    return `<path d="M${num(x)} ${num(y)}q${num(a.x)} ${num(a.y)} ${num(b.x)} ${num(b.y)}" fill="none" stroke="#d9dbd2" stroke-width=".05" stroke-opacity=".4"/>`;
  });
  const smears = Array.from({ length: 5 }, () => {
    const { x, y } = spot();
    const size = chance.between(6, 16);
    return ellipse(
      x,
      y,
      size,
      size * chance.between(0.4, 0.8),
      paints.patch('#e8ede8', chance.between(0.03, 0.07)),
    );
  });
  return [...smears, ...specks, ...lint].join('');
}

const spotNear = (chance: Chance, reach: number) =>
  at(chance.between(-reach, reach), chance.between(-reach, reach));

/** Marks on the board itself; they lie under every body. */
export function marksLayer(scene: Scene): string {
  const out: string[] = [dust(scene)];
  for (const part of scene.plan.parts) {
    const wear = scene.wear.get(part.ref);
    if (wear === undefined) continue;
    if (wear === 'fresh' && part.body.look !== 'arcs') out.push(flux(scene, part));
    if (part.side !== scene.face.side) continue;
    if (SOOTY.has(wear)) {
      const mild = part.body.look === 'fuse' || part.body.look === 'sot23' ? 0.35 : 1;
      out.push(soot(scene, part, mild));
    }
    if (wear === 'baked') out.push(soot(scene, part, 0.3));
  }
  const outline = `${polyline(scene.face.outline)}z`;
  const id = scene.paints.define((id) => `<clipPath id="${id}"><path d="${outline}"/></clipPath>`);
  return `<g clip-path="url(#${id})">${out.join('')}</g>`;
}

export function bodyLayer(scene: Scene): string {
  return [...scene.face.parts]
    .sort((p, q) => p.tall - q.tall)
    .map((part) => {
      const { x, y } = scene.face.flip(part.at);
      return moved(drawBody(part, brushFor(scene, part)), x, y, part.turn);
    })
    .join('');
}

const FALL = at(-LAMP.x * 0.62, -LAMP.y * 0.62);

/** Silhouettes of the bodies, drawn out along the light: black on nothing. */
export function shadowLayer(scene: Scene): string {
  const steps = 4;
  return scene.face.parts
    .flatMap((part) =>
      shadeOf(part, scene.wear.get(part.ref) ?? 'good').flatMap(({ path, tall }) =>
        Array.from({ length: steps }, (_, i) => {
          const far = (tall * (i + 1)) / steps;
          const { x, y } = scene.face.flip(part.at);
          return `<path d="${path}" transform="translate(${num(x + FALL.x * far)} ${num(y + FALL.y * far)}) rotate(${num(part.turn)})" fill-opacity="${i === steps - 1 ? 0.22 : 0.26}"/>`;
        }),
      ),
    )
    .join('');
}

/** The foot of each body, a little wider than it: where no light comes in under it. */
export function contactLayer(scene: Scene): string {
  return scene.face.parts
    .flatMap((part) =>
      shadeOf(part, scene.wear.get(part.ref) ?? 'good').map(({ path, tall }) => {
        const { x, y } = scene.face.flip(part.at);
        const wide = Math.min(1.4, 0.35 + tall * 0.12);
        return `<path d="${path}" transform="translate(${num(x + 0.12)} ${num(y + 0.16)}) rotate(${num(part.turn)})" stroke="#000" stroke-width="${num(wide)}" stroke-linejoin="round" fill-opacity=".8" stroke-opacity=".8"/>`;
      }),
    )
    .join('');
}
