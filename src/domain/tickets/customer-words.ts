/** What a customer reads of each stage: plain words, nothing of the bench. */
import type { Stage } from './stages';

export const CUSTOMER_HEADLINES: Record<Stage, string> = {
  received: 'Your instrument is with us.',
  'on-the-bench': 'A technician is looking for the fault.',
  'estimate-sent': 'We found the fault. Your answer is needed.',
  approved: 'You approved the estimate. The repair is next.',
  'in-repair': 'Your instrument is being repaired.',
  'release-check': 'Repaired. We are checking that it is safe and measures right.',
  ready: 'Ready. You can collect it.',
  'handed-over': 'Handed over. Thank you.',
  'waiting-for-parts': 'We are waiting for parts.',
  declined: 'You declined the estimate. We keep the instrument ready for you to collect.',
  'beyond-repair': 'We cannot repair this instrument safely. Please collect it.',
  'returned-unrepaired': 'Returned unrepaired.',
};

/** One line of the dated history. */
export const CUSTOMER_HISTORY: Record<Stage, string> = {
  received: 'We took in your instrument.',
  'on-the-bench': 'It went to the bench.',
  'estimate-sent': 'We sent you an estimate.',
  approved: 'The estimate was approved.',
  'in-repair': 'The repair began.',
  'release-check': 'The release check began.',
  ready: 'It is ready to collect.',
  'handed-over': 'It was handed over.',
  'waiting-for-parts': 'The work waits for parts.',
  declined: 'The estimate was declined.',
  'beyond-repair': 'We found that it cannot be repaired safely.',
  'returned-unrepaired': 'It was returned unrepaired.',
};

/** The stages a customer's scale shows, in order. */
export const CUSTOMER_SCALE: readonly Stage[] = [
  'received',
  'on-the-bench',
  'estimate-sent',
  'approved',
  'in-repair',
  'release-check',
  'ready',
  'handed-over',
];
