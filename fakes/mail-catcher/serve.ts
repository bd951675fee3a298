import * as z from 'zod/v4';
import { runUntilStopped } from '../shared/run';
import { port, readSettings } from '../shared/settings';
import { startMailCatcher } from './server';

const settings = z.object({
  port,
  httpPort: port,
  controlPort: port,
  data: z.string().min(1),
  maxMessageBytes: z.coerce.number().int().min(1).optional(),
  maxMessages: z.coerce.number().int().min(1).optional(),
});

await runUntilStopped(
  async () =>
    startMailCatcher(readSettings(settings, 'FAKE_MAIL', process.argv.slice(2), process.env)),
  ({ port: smtp, httpPort, controlPort }) =>
    `mail catcher smtp://127.0.0.1:${smtp} inbox http://127.0.0.1:${httpPort} control http://127.0.0.1:${controlPort}`,
);
