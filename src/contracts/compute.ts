/** The computations outside clients rely on; their shapes are fixed. */
import * as z from 'zod/v4';
import { INCIDENTS, MODES, PART_KINDS, STANDINGS } from '@/domain/parts/kinds';
import { line } from './common';
import { defineRoute } from './route';

const Name = line(40, 1);
const Tolerance = z.number().gt(0).lt(1);
const ohms = z.number().min(1e-9, 'Not above zero: ohms are needed, a nanoohm at least.').max(1e15);

export const MAX_PARTS = 200;
export const MAX_READINGS = 60;

export const NetworkPart = z.object({
  ref: Name,
  kind: z.enum(PART_KINDS),
  nets: z.tuple([Name, Name]),
  ohms: ohms.optional(),
  tolerance: Tolerance.optional(),
  closed: z.array(Name).max(60).optional(),
});
export const Network = z.object({
  positions: z.array(Name).max(60).default([]),
  parts: z.array(NetworkPart),
});

const OhmsOrOver = z.union(
  [z.number().min(0).max(1e15), z.literal('OL')],
  'Not a resistance: 0 to 1e15 Ω as a number, or OL, are needed.',
);
const Accuracy = z.object({
  percent: z.number().min(0).max(100),
  counts: z.number().min(0).max(10_000),
});

export const ReadingInput = z.object({
  from: Name,
  to: Name,
  position: Name.optional(),
  value: OhmsOrOver,
  accuracy: Accuracy.optional(),
  resolution: z.number().gt(0).max(1e12).optional(),
  overRange: ohms.optional(),
  lifted: z.array(Name).max(20).default([]),
});

export const Diagnosis = z.object({
  network: Network,
  readings: z.array(ReadingInput),
  incident: z.enum(INCIDENTS).default('unknown'),
  limit: z.int().min(1).max(200).default(20),
});

const Fault = z.object({ ref: z.string(), mode: z.enum(MODES) });
export const DiagnosisAnswer = z.object({
  healthy: z.number(),
  entropy: z.number(),
  hypotheses: z.array(z.object({ faults: z.array(Fault), probability: z.number() })),
  parts: z.array(
    z.object({
      ref: z.string(),
      standing: z.enum(STANDINGS),
      fault: z.number(),
      modes: z.partialRecord(z.enum(MODES), z.number()),
    }),
  ),
  groups: z.array(z.array(z.string())),
  next: z.array(
    z.object({
      from: z.string(),
      to: z.string(),
      position: z.string(),
      lifted: z.array(z.string()),
      bits: z.number(),
      cost: z.number(),
    }),
  ),
  doubtful: z.array(z.object({ reading: z.int(), reason: z.string() })),
  reasons: z.array(z.string()),
});

export const PartCheck = z.object({
  kind: z.enum(PART_KINDS),
  ohms: ohms.optional(),
  marking: z.string().trim().min(1).max(40).optional(),
  tolerance: Tolerance.optional(),
  value: OhmsOrOver,
  inCircuit: z.boolean(),
  position: Name.optional(),
});
export const PartCheckAnswer = z.object({
  verdict: z.enum(['fits', 'suspect', 'inconclusive']),
  mode: z.enum(MODES).optional(),
  probability: z.number(),
  reasons: z.array(z.string()),
  next: z.string().optional(),
});

export const computeRoutes = {
  diagnosis: defineRoute({
    method: 'POST',
    path: '/api/diagnosis',
    summary: 'Rank what may have failed in a network from readings.',
    who: 'compute.use',
    body: Diagnosis,
    answer: DiagnosisAnswer,
    status: 200,
  }),
  partCheck: defineRoute({
    method: 'POST',
    path: '/api/part-check',
    summary: 'Judge one part alone by one reading.',
    who: 'compute.use',
    body: PartCheck,
    answer: PartCheckAnswer,
    status: 200,
  }),
  markings: defineRoute({
    method: 'GET',
    path: '/api/markings',
    summary: 'Every reading of a printed marking.',
    who: 'compute.use',
    query: z.object({
      text: z.string().trim().min(1, 'Nothing was given: a marking is needed.').max(40),
      kind: z.enum(PART_KINDS).optional(),
    }),
    answer: z.object({
      readings: z.array(
        z.object({
          kind: z.string(),
          value: z.number(),
          unit: z.string(),
          tolerance: z.number().nullable(),
          source: z.string(),
          ratings: z.record(z.string(), z.unknown()).optional(),
        }),
      ),
    }),
    status: 200,
  }),
};
