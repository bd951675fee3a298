/**
 * The life of a fault note: draft, in review, published, retired; who may move it. A published note is corrected by
 * seniors in place: each save is a new revision that nobody else reads until `publish` puts it in the old one's place,
 * or `drop` gives it up.
 */
import type { Role } from '../people';

export const FAULT_STATES = ['draft', 'in-review', 'published', 'retired'] as const;
export type FaultState = (typeof FAULT_STATES)[number];

export const FAULT_STATE_LABELS: Record<FaultState, string> = {
  draft: 'draft',
  'in-review': 'in review',
  published: 'published',
  retired: 'retired',
};

/** A note as one person meets it. */
export type FaultStanding = {
  state: FaultState;
  /** Written by whoever asks. */
  own: boolean;
  /** Published, with a newer revision that readers do not see yet. */
  correction: boolean;
};

const bench: readonly Role[] = ['technician', 'senior', 'owner'];
const seniors: readonly Role[] = ['senior', 'owner'];

type Rule = {
  label: string;
  from: readonly FaultState[];
  to: FaultState;
  who: readonly Role[];
  /** Only its author may. */
  own?: true;
  /** From `published` only when a correction waits. */
  correction?: true;
  /** Every section, and a board or a family, must be there first. */
  complete?: true;
  /** What has to be written with the step. */
  note?: string;
};

const RULES = {
  submit: {
    label: 'Send to review',
    from: ['draft'],
    to: 'in-review',
    who: bench,
    complete: true,
  },
  'take-back': {
    label: 'Take back',
    from: ['in-review'],
    to: 'draft',
    who: bench,
    own: true,
  },
  'send-back': {
    label: 'Send back',
    from: ['in-review'],
    to: 'draft',
    who: seniors,
    note: 'what is still missing',
  },
  publish: {
    label: 'Publish',
    from: ['draft', 'in-review', 'published', 'retired'],
    to: 'published',
    who: seniors,
    correction: true,
    complete: true,
  },
  drop: {
    label: 'Drop the correction',
    from: ['published'],
    to: 'published',
    who: seniors,
    correction: true,
  },
  retire: {
    label: 'Retire',
    from: ['published'],
    to: 'retired',
    who: seniors,
    note: 'why it no longer holds',
  },
  reopen: { label: 'Reopen as draft', from: ['retired'], to: 'draft', who: seniors },
} as const satisfies Record<string, Rule>;

export type FaultStep = keyof typeof RULES;
export const FAULT_STEPS = Object.keys(RULES) as [FaultStep, ...FaultStep[]];
const rule = (step: FaultStep): Rule => RULES[step];

export type FaultStepAnswer =
  | { ok: true; to: FaultState; complete: boolean }
  | { ok: false; why: 'not-allowed' | 'not-from-here' | 'missing'; reason: string; path?: string };

const startsFrom = (r: Rule, now: FaultStanding) =>
  r.from.includes(now.state) && !(r.correction && now.state === 'published' && !now.correction);

/** Decides one step of a note's life; `complete` says that the caller must check the text first. */
export function decideFaultStep(
  now: FaultStanding,
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
  if (r.own && !now.own)
    return { ok: false, why: 'not-allowed', reason: `«${r.label}» is for the note’s author.` };
  if (!startsFrom(r, now))
    return {
      ok: false,
      why: 'not-from-here',
      reason: r.from.includes(now.state)
        ? `«${r.label}» needs a correction that waits, and there is none.`
        : `The note is «${FAULT_STATE_LABELS[now.state]}»: «${r.label}» starts from ${r.from
            .map((s) => `«${FAULT_STATE_LABELS[s]}»`)
            .join(' or ')}.`,
    };
  if (r.note && note.trim() === '')
    return { ok: false, why: 'missing', path: 'note', reason: `Write ${r.note}.` };
  return { ok: true, to: r.to, complete: r.complete ?? false };
}

/** The steps this role may take from here. */
export function offeredFaultSteps(now: FaultStanding, role: Role) {
  return FAULT_STEPS.filter((s) => {
    const r = rule(s);
    return r.who.includes(role) && (!r.own || now.own) && startsFrom(r, now);
  }).map((step) => ({
    step,
    label: step === 'publish' && now.correction ? 'Publish the correction' : rule(step).label,
    note: rule(step).note ?? null,
  }));
}
