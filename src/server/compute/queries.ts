/** The computations for outside clients: what they send is checked whole before anything is computed. */
import type * as z from 'zod/v4';
import {
  MAX_PARTS,
  MAX_READINGS,
  type Diagnosis,
  type DiagnosisAnswer,
  type PartCheck,
  type PartCheckAnswer,
} from '@/contracts/compute';
import { diagnose } from '@/domain/diagnosis/diagnose';
import { violations } from '@/domain/network/validate';
import { checkPart } from '@/domain/parts/check';
import { done, refuse, type FieldError, type Outcome } from '../refusal';

type Asked = z.output<typeof Diagnosis>;
type Answered<S extends z.ZodType> = Outcome<{ json: z.input<S> }>;

const tooMany = (path: string, given: number, most: number) =>
  refuse('too-large', `${given} given at ${path}: ${most} are the most.`, {
    errors: [{ path, message: `${given} given, ${most} are the most` }],
  });

/** Everything about the readings that the network does not bear out. */
function readingErrors({ network, readings }: Asked): FieldError[] {
  const nets = new Set(network.parts.flatMap((p) => p.nets));
  const refs = new Set(network.parts.map((p) => p.ref));
  const errors: FieldError[] = [];
  const say = (path: string, message: string) => errors.push({ path, message });
  readings.forEach((reading, i) => {
    const at = `readings[${i}]`;
    for (const end of ['from', 'to'] as const)
      if (!nets.has(reading[end]))
        say(`${at}.${end}`, `${reading[end]} is no net of the network, one of its nets is needed`);
    if (reading.from === reading.to)
      say(`${at}.to`, `${reading.to} is where the reading starts, another net is needed`);
    if (reading.position !== undefined && !network.positions.includes(reading.position))
      say(
        `${at}.position`,
        `${reading.position} is no position of the network, one of its positions is needed`,
      );
    reading.lifted.forEach((ref, k) => {
      if (!refs.has(ref))
        say(`${at}.lifted[${k}]`, `${ref} is no part of the network, one of its parts is needed`);
    });
  });
  return errors;
}

/** Ranks what may have failed, or names everything that is wrong with what was sent. */
export function diagnosisOf(asked: Asked): Answered<typeof DiagnosisAnswer> {
  const { network, readings } = asked;
  if (network.parts.length > MAX_PARTS)
    return tooMany('network.parts', network.parts.length, MAX_PARTS);
  if (readings.length > MAX_READINGS) return tooMany('readings', readings.length, MAX_READINGS);
  const errors = [
    ...violations(network).map((v) => ({ ...v, path: `network.${v.path}` })),
    ...readingErrors(asked),
  ];
  const first = errors[0];
  if (first) return refuse('invalid', `${first.path}: ${first.message}`, { errors });
  return done({ json: diagnose(asked) as z.input<typeof DiagnosisAnswer> });
}

/** Judges one part alone. */
export function partCheckOf(asked: z.output<typeof PartCheck>): Answered<typeof PartCheckAnswer> {
  const answer = checkPart(asked);
  if (!answer.ok)
    return refuse('invalid', answer.reason, {
      errors: [{ path: answer.path, message: answer.reason }],
    });
  const { ok: _ok, ...verdict } = answer;
  return done({ json: { ...verdict, reasons: [...verdict.reasons] } });
}
