/**
 * The one state machine of a ticket: who may take which step, from where to where, and what must be true first.
 * Pages, endpoints and e-mails all ask it; nothing else knows a transition.
 */
import type { Role } from '../people';

export const MAIN_STAGES = [
  'received',
  'on-the-bench',
  'estimate-sent',
  'approved',
  'in-repair',
  'release-check',
  'ready',
  'handed-over',
] as const;
export const SIDE_STAGES = [
  'waiting-for-parts',
  'declined',
  'beyond-repair',
  'returned-unrepaired',
] as const;
export const STAGES = [...MAIN_STAGES, ...SIDE_STAGES] as const;
export type Stage = (typeof STAGES)[number];

/** The words on the scale. */
export const STAGE_LABELS: Record<Stage, string> = {
  received: 'received',
  'on-the-bench': 'on the bench',
  'estimate-sent': 'estimate sent',
  approved: 'approved',
  'in-repair': 'in repair',
  'release-check': 'release check',
  ready: 'ready',
  'handed-over': 'handed over',
  'waiting-for-parts': 'waiting for parts',
  declined: 'declined',
  'beyond-repair': 'beyond repair',
  'returned-unrepaired': 'returned unrepaired',
};

/** Stages from which no step leads on: the ticket is closed. */
export const CLOSED_STAGES = ['handed-over', 'returned-unrepaired'] as const satisfies Stage[];
export const isClosed = (stage: Stage): boolean =>
  (CLOSED_STAGES as readonly Stage[]).includes(stage);

/** What the machine is told of a ticket. */
export type TicketFacts = {
  stage: Stage;
  stageBefore: Stage | null;
  cautionsTicked: boolean;
  /** Whether the board is known with a network that readings can be judged on. */
  hasNetwork: boolean;
  afterRepair: {
    readings: number;
    /** Those that say something: on the board's network, or of a part judged alone. */
    usable: number;
    /** References of the parts that they accuse. */
    accused: readonly string[];
  };
};

const bench: readonly Role[] = ['technician', 'senior', 'owner'];
const staff: readonly Role[] = ['counter', 'technician', 'senior', 'owner'];
const seniors: readonly Role[] = ['senior', 'owner'];

type Rule = {
  label: string;
  from: readonly Stage[];
  to: Stage | 'before';
  who: readonly Role[];
  /** What the note must say; absent when a note is optional. A customer's own step needs none. */
  note?: string | ((facts: TicketFacts) => string | null);
  /** Why the step would be an exception that its note signs. */
  exception?: (facts: TicketFacts) => string | null;
  estimate?: true;
  requires?: (facts: TicketFacts) => string | null;
};

const cautionsFirst = (facts: TicketFacts) =>
  facts.cautionsTicked ? null : 'The cautions are not all ticked: tick them on the ticket first.';
/** A reading proves something where the board's network, or its part, can judge it. */
function proofOfRepair(facts: TicketFacts): string | null {
  const { readings, usable } = facts.afterRepair;
  if (readings === 0)
    return 'No reading after repair is on the bench sheet: enter at least one first.';
  if (facts.hasNetwork && usable === 0)
    return 'No reading after repair can be judged on the board’s network: name points or parts of it first.';
  return cautionsFirst(facts);
}
const accusedStill = ({ afterRepair: { accused } }: TicketFacts) =>
  accused.length === 0
    ? null
    : `The readings after repair still accuse ${accused.join(', ')}: to let it go is an exception.`;

const RULES = {
  begin: {
    label: 'Take to the bench',
    from: ['received'],
    to: 'on-the-bench',
    who: bench,
  },
  'send-estimate': {
    label: 'Send estimate',
    from: ['on-the-bench'],
    to: 'estimate-sent',
    who: bench,
    estimate: true,
  },
  approve: {
    label: 'Approve estimate',
    from: ['estimate-sent'],
    to: 'approved',
    who: ['customer', ...staff],
    note: 'how the customer approved',
  },
  decline: {
    label: 'Decline estimate',
    from: ['estimate-sent'],
    to: 'declined',
    who: ['customer', ...staff],
    note: 'how the customer declined',
  },
  'start-repair': {
    label: 'Start repair',
    from: ['approved'],
    to: 'in-repair',
    who: bench,
    requires: cautionsFirst,
  },
  'wait-for-parts': {
    label: 'Wait for parts',
    from: ['on-the-bench', 'approved', 'in-repair'],
    to: 'waiting-for-parts',
    who: bench,
    note: 'which parts are awaited',
  },
  'parts-arrived': {
    label: 'Parts arrived',
    from: ['waiting-for-parts'],
    to: 'before',
    who: staff,
  },
  'begin-release-check': {
    label: 'Begin release check',
    from: ['in-repair'],
    to: 'release-check',
    who: bench,
    note: (facts) =>
      facts.hasNetwork ? null : 'what shows the repair, as no network of its board can',
    requires: proofOfRepair,
  },
  'back-to-repair': {
    label: 'Back to repair',
    from: ['release-check'],
    to: 'in-repair',
    who: bench,
    note: 'what did not pass',
  },
  release: {
    label: 'Sign release',
    from: ['release-check'],
    to: 'ready',
    who: seniors,
    note: (facts) =>
      accusedStill(facts)
        ? 'why it may leave all the same'
        : 'what was checked and how, or why it may leave without',
    exception: accusedStill,
    requires: proofOfRepair,
  },
  'back-to-bench': {
    label: 'Back to the bench',
    from: ['estimate-sent', 'declined', 'beyond-repair'],
    to: 'on-the-bench',
    who: bench,
    note: 'why it goes back',
  },
  'give-up': {
    label: 'Beyond repair',
    from: ['on-the-bench', 'in-repair', 'release-check', 'waiting-for-parts'],
    to: 'beyond-repair',
    who: bench,
    note: 'why it cannot be repaired safely',
  },
  'hand-over': {
    label: 'Hand over',
    from: ['ready'],
    to: 'handed-over',
    who: staff,
  },
  'return-unrepaired': {
    label: 'Return unrepaired',
    from: ['declined', 'beyond-repair'],
    to: 'returned-unrepaired',
    who: staff,
  },
} as const satisfies Record<string, Rule>;

export type Step = keyof typeof RULES;
export const STEPS = Object.keys(RULES) as [Step, ...Step[]];
const rule = (step: Step): Rule => RULES[step];

export type StepInput = { note: string; estimate?: { minor: number; work: string } | null };
export type StepAnswer =
  | { ok: true; to: Stage; exception: boolean }
  | { ok: false; why: 'not-allowed' | 'not-from-here' | 'missing'; reason: string; path?: string };

function noteOf(step: Step, facts: TicketFacts): string | null {
  const { note = null } = rule(step);
  return typeof note === 'function' ? note(facts) : note;
}

/** The stage a step leads to, for a ticket that stands where `facts` say. */
function target(step: Step, facts: TicketFacts): Stage {
  const to = rule(step).to;
  return to === 'before' ? (facts.stageBefore ?? 'on-the-bench') : to;
}

/** Decides one step. A customer's own step needs no note; a member of staff says how they know. */
export function decideStep(
  facts: TicketFacts,
  role: Role,
  step: Step,
  input: StepInput,
): StepAnswer {
  const r = rule(step);
  if (!r.who.includes(role))
    return {
      ok: false,
      why: 'not-allowed',
      reason: `«${r.label}» was asked by ${role}: it needs ${r.who.join(' or ')}.`,
    };
  if (!r.from.includes(facts.stage))
    return {
      ok: false,
      why: 'not-from-here',
      reason: `The ticket is at «${STAGE_LABELS[facts.stage]}»: «${r.label}» starts from ${r.from
        .map((s) => `«${STAGE_LABELS[s]}»`)
        .join(' or ')}.`,
    };
  const unmet = r.requires?.(facts) ?? null;
  if (unmet) return { ok: false, why: 'missing', reason: unmet };
  const note = noteOf(step, facts);
  if (note && role !== 'customer' && input.note.trim() === '')
    return { ok: false, why: 'missing', path: 'note', reason: `Write ${note}.` };
  if (r.estimate && !input.estimate)
    return {
      ok: false,
      why: 'missing',
      path: 'estimate',
      reason: 'No price was given: write the total and the work it covers.',
    };
  const exception = r.exception?.(facts) ?? null;
  return { ok: true, to: target(step, facts), exception: exception !== null };
}

/** True when a step goes forward along the scale: the usual next thing to do. */
export function leadsOn(from: Stage, to: Stage): boolean {
  const line: readonly Stage[] = MAIN_STAGES;
  const place = line.indexOf(to);
  return place >= 0 && (line.includes(from) ? place > line.indexOf(from) : true);
}

export type OfferedStep = {
  step: Step;
  label: string;
  to: Stage;
  note: string | null;
  estimate: boolean;
  /** Why it cannot be taken yet; null when it can. */
  blocked: string | null;
  /** Why it is an exception, signed by the note, which the customer reads; null when it is none. */
  exception: string | null;
};

/** The steps this role may take from here, the usual one first; blocked ones carry the reason. */
export function offeredSteps(facts: TicketFacts, role: Role): OfferedStep[] {
  return STEPS.filter((s) => rule(s).who.includes(role) && rule(s).from.includes(facts.stage)).map(
    (step) => {
      const r = rule(step);
      return {
        step,
        label: r.label,
        to: target(step, facts),
        note: role === 'customer' ? null : noteOf(step, facts),
        estimate: r.estimate ?? false,
        blocked: r.requires?.(facts) ?? null,
        exception: r.exception?.(facts) ?? null,
      };
    },
  );
}
