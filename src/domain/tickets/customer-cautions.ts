/** What a customer must know of an instrument that failed, by stage: the usual cautions of the trade. */
import { isClosed, type Stage } from './stages';

/** Cautions for the customer's page and papers, the most pressing first. */
export function customerCautions(stage: Stage, exception: string | null): string[] {
  const cautions: string[] = [];
  if (stage === 'declined' || stage === 'beyond-repair' || stage === 'returned-unrepaired')
    cautions.push(
      'This instrument is not repaired: don’t use it on mains, and don’t rely on it to tell you that a circuit is dead.',
    );
  else if (!isClosed(stage) && stage !== 'ready')
    cautions.push('Don’t use this instrument on mains until it has passed its release check.');
  if (exception !== null)
    cautions.push(`It was released with an exception, signed by a senior: ${exception}`);
  if (stage === 'ready' || stage === 'handed-over')
    cautions.push(
      'Before each use, check the leads and try the instrument on a source you know. The maker’s instructions and your local rules come first.',
    );
  return cautions;
}
