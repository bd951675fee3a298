/** The computations for outside clients. */
import type * as z from 'zod/v4';
import type { Diagnosis, DiagnosisAnswer, PartCheck, PartCheckAnswer } from '@/contracts/compute';
import { diagnose } from '@/domain/diagnosis/diagnose';
import { checkPart } from '@/domain/parts/check';
import { done, refuse, type Outcome } from '../refusal';

type Answered<S extends z.ZodType> = Outcome<{ json: z.input<S> }>;

/** Ranks what may have failed; the request is one that `diagnosisRefusal` has nothing against. */
export function diagnosisOf(asked: z.output<typeof Diagnosis>): Answered<typeof DiagnosisAnswer> {
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
