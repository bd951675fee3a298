/** Everything that is wrong with a diagnosis request, named in one answer: its shape, its network, its readings. */
import { Diagnosis, MAX_PARTS, MAX_READINGS } from '@/contracts/compute';
import type { Network, NetworkPart } from '@/domain/network/types';
import { violations } from '@/domain/network/validate';
import { PART_KINDS, type PartKind } from '@/domain/parts/kinds';
import { fieldErrors } from '../http/problem';
import { refuse, type FieldError, type Refusal } from '../refusal';

type Loose = Record<string, unknown>;
type LooseReading = { from: unknown; to: unknown; position: unknown; lifted: unknown[] };
/** What of a request can be judged whatever else is wrong with it; names that cannot be read are empty marks. */
type Sketch = { network: Network; readings: LooseReading[]; whole: boolean };

/** More problems than this help nobody. */
const MOST_NAMED = 2_000;
/** Stands for a name that is none: no name has a control character and is unlike any other. */
const mark = (path: string) => `\u0000${path}`;
const isMark = (name: string) => name.startsWith('\u0000');

const record = (value: unknown): Loose =>
  typeof value === 'object' && value !== null ? (value as Loose) : {};
const list = (value: unknown): unknown[] => (Array.isArray(value) ? value : []);
const nameOr = (value: unknown, path: string) =>
  typeof value === 'string' && value.trim() !== '' ? value.trim() : mark(path);

function sketchPart(raw: unknown, i: number): NetworkPart {
  const part = record(raw);
  const nets = list(part['nets']);
  const kind = PART_KINDS.find((one) => one === part['kind']);
  const given = part['ohms'] !== undefined || kind === undefined;
  const closed = list(part['closed']).map((one, k) => nameOr(one, `closed${i}.${k}`));
  return {
    ref: nameOr(part['ref'], `ref${i}`),
    kind: kind ?? ('resistor' satisfies PartKind),
    nets: [nameOr(nets[0], `a${i}`), nameOr(nets[1], `b${i}`)],
    // Its value is the schema's business; here it matters only whether there is one.
    ohms: given ? 1 : undefined,
    closed: kind === undefined || part['closed'] === undefined ? undefined : closed,
  };
}

function sketchOf(raw: unknown): Sketch {
  const network = record(record(raw)['network']);
  const parts = list(network['parts']).map(sketchPart);
  const positions = list(network['positions']).map((one, i) => nameOr(one, `position${i}`));
  const names = [...positions, ...parts.flatMap(({ ref, nets }) => [ref, ...nets])];
  return {
    network: { positions, parts },
    readings: list(record(raw)['readings']).map((one) => {
      const { from, to, position, lifted } = record(one);
      return { from, to, position, lifted: list(lifted) };
    }),
    whole: !names.some(isMark),
  };
}

/** Everything about the readings that the network does not bear out. */
function readingErrors({ network, readings, whole }: Sketch): FieldError[] {
  const nets = new Set(network.parts.flatMap((part) => part.nets));
  const refs = new Set(network.parts.map((part) => part.ref));
  const errors: FieldError[] = [];
  const say = (path: string, message: string) => errors.push({ path, message });
  /** A name that the network does not know; not to be told while the network's own names cannot be read. */
  const strange = (name: unknown, known: { has(name: string): boolean }): name is string =>
    whole && typeof name === 'string' && name.trim() !== '' && !known.has(name.trim());
  const positions = new Set(network.positions);
  readings.forEach((reading, i) => {
    const at = `readings[${i}]`;
    for (const end of ['from', 'to'] as const)
      if (strange(reading[end], nets))
        say(`${at}.${end}`, `${reading[end]} is no net of the network, one of its nets is needed`);
    if (typeof reading.to === 'string' && reading.from === reading.to)
      say(`${at}.to`, `${reading.to} is where the reading starts, another net is needed`);
    if (strange(reading.position, positions))
      say(
        `${at}.position`,
        `${reading.position} is no position of the network, one of its positions is needed`,
      );
    reading.lifted.forEach((ref, k) => {
      if (strange(ref, refs))
        say(`${at}.lifted[${k}]`, `${ref} is no part of the network, one of its parts is needed`);
    });
  });
  return errors;
}

const tooMany = (path: string, given: number, most: number) =>
  refuse('too-large', `${given} given at ${path}: ${most} are the most.`, {
    errors: [{ path, message: `${given} given, ${most} are the most` }],
  });

/** True when the schema has refused this field, or something around it. */
const isCovered = (path: string, shape: readonly FieldError[]) =>
  shape.some(
    (one) =>
      one.path === '' ||
      path === one.path ||
      path.startsWith(`${one.path}.`) ||
      path.startsWith(`${one.path}[`),
  );

/**
 * The refusal of a diagnosis request as it was sent: too many parts or readings first, then every field that the
 * schema, the network's rules or the readings' names object to. Null when it can be computed.
 */
export function diagnosisRefusal(raw: unknown): Refusal | null {
  const sketch = sketchOf(raw);
  const { parts } = sketch.network;
  if (parts.length > MAX_PARTS) return tooMany('network.parts', parts.length, MAX_PARTS);
  if (sketch.readings.length > MAX_READINGS)
    return tooMany('readings', sketch.readings.length, MAX_READINGS);
  const parsed = Diagnosis.safeParse(raw);
  const shape = parsed.success ? [] : fieldErrors(parsed.error.issues, MOST_NAMED);
  const rules = [
    ...violations(sketch.network).map((v) => ({ ...v, path: `network.${v.path}` })),
    ...readingErrors(sketch),
  ].filter(({ path, message }) => !message.includes('\u0000') && !isCovered(path, shape));
  const errors = [...shape, ...rules];
  const [first] = errors;
  return first ? refuse('invalid', `${first.path || 'body'}: ${first.message}`, { errors }) : null;
}
