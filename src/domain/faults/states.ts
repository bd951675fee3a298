/** The life of a fault note: draft, in review, published, retired; who may move it. */
import type { Role } from '../people';

export const FAULT_STATES = ['draft', 'in-review', 'published', 'retired'] as const;
export type FaultState = (typeof FAULT_STATES)[number];

export const FAULT_STATE_LABELS: Record<FaultState, string> = {
  draft: 'draft',
  'in-review': 'in review',
  published: 'published',
  retired: 'retired',
};

const bench: readonly Role[] = ['technician', 'senior', 'owner'];
const seniors: readonly Role[] = ['senior', 'owner'];

type Rule = {
  label: string;
  from: readonly FaultState[];
  to: FaultState;
  who: readonly Role[];
  note?: string;
};

const RULES = {
  submit: { label: 'Send to review', from: ['draft'], to: 'in-review', who: bench },
  'send-back': {
    label: 'Send back',
    from: ['in-review'],
    to: 'draft',
    who: seniors,
    note: 'what is still missing',
  },
  publish: {
    label: 'Publish',
    from: ['draft', 'in-review', 'retired'],
    to: 'published',
    who: seniors,
  },
  retire: {
    label: 'Retire',
    from: ['published'],
    to: 'retired',
    who: seniors,
    note: 'why it no longer holds',
  },
} as const satisfies Record<string, Rule>;

export type FaultStep = keyof typeof RULES;
export const FAULT_STEPS = Object.keys(RULES) as [FaultStep, ...FaultStep[]];
const rule = (step: FaultStep): Rule => RULES[step];

export type FaultStepAnswer =
  | { ok: true; to: FaultState }
  | { ok: false; why: 'not-allowed' | 'not-from-here' | 'missing'; reason: string; path?: string };

/** Decides one step of a note's life. */
export function decideFaultStep(
  state: FaultState,
  role: Role,
  step: FaultStep,
  note: string,
): FaultStepAnswer {
  const r = rule(step);
  if (!r.who.includes(role))
    return {
      ok: false,
      why: 'not-allowed',
      reason: `«${r.label}» was asked by ${role}: it needs ${r.who.join(' or ')}.`,
    };
  if (!r.from.includes(state))
    return {
      ok: false,
      why: 'not-from-here',
      reason: `The note is «${FAULT_STATE_LABELS[state]}»: «${r.label}» starts from ${r.from
        .map((s) => `«${FAULT_STATE_LABELS[s]}»`)
        .join(' or ')}.`,
    };
  if (r.note && note.trim() === '')
    return { ok: false, why: 'missing', path: 'note', reason: `Write ${r.note}.` };
  return { ok: true, to: r.to };
}

/** The steps this role may take from here. */
export function offeredFaultSteps(state: FaultState, role: Role) {
  return FAULT_STEPS.filter((s) => rule(s).who.includes(role) && rule(s).from.includes(state)).map(
    (step) => ({ step, label: rule(step).label, note: rule(step).note ?? null }),
  );
}
