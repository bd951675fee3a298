import * as z from 'zod/v4';
import { runUntilStopped } from '../shared/run';
import { port, readSettings } from '../shared/settings';
import { startObjectStore } from './server';

const list = z
  .string()
  .optional()
  .transform((text) => (text === undefined ? [] : text.split(',').map((item) => item.trim())));

const settings = z.object({
  port,
  controlPort: port,
  data: z.string().min(1),
  key: z.string().regex(/^[A-Za-z0-9_-]{3,128}$/, 'needs 3 to 128 letters, digits, - or _'),
  secret: z.string().min(8),
  region: z.string().min(1).default('us-east-1'),
  buckets: list,
  corsOrigins: list,
  maxObjectBytes: z.coerce.number().int().min(1).optional(),
});

await runUntilStopped(
  async () => {
    const { corsOrigins, ...rest } = readSettings(
      settings,
      'FAKE_STORE',
      process.argv.slice(2),
      process.env,
    );
    const any = corsOrigins.length === 0 || corsOrigins.includes('*');
    return startObjectStore({ ...rest, corsOrigins: any ? '*' : corsOrigins });
  },
  ({ port: taken, controlPort }) =>
    `object store http://127.0.0.1:${taken} control http://127.0.0.1:${controlPort}`,
);
