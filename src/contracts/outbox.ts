import * as z from 'zod/v4';
import { Id } from './common';

/** The owner asks for one more try of a job. */
export const RetryForm = z.object({ id: Id });
