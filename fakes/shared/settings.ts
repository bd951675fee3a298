import { parseArgs } from 'node:util';
import * as z from 'zod/v4';

const flagOf = (name: string) => name.replace(/[A-Z]/g, (letter) => `-${letter.toLowerCase()}`);
const envOf = (prefix: string, name: string) =>
  `${prefix}_${flagOf(name).replaceAll('-', '_').toUpperCase()}`;

/** A TCP port; 0 asks the system for a free one. */
export const port = z.coerce.number().int().min(0).max(65535);

/**
 * The settings of a server: `--control-port 9001` on the command line, else `PREFIX_CONTROL_PORT`
 * from the environment, else the schema's default.
 *
 * @throws Error naming the flag and its variable when a setting is unknown, missing or unfit.
 */
export function readSettings<Shape extends z.ZodRawShape>(
  schema: z.ZodObject<Shape>,
  prefix: string,
  argv: readonly string[],
  env: NodeJS.ProcessEnv,
): z.infer<z.ZodObject<Shape>> {
  const names = Object.keys(schema.shape);
  const options = Object.fromEntries(
    names.map((name) => [flagOf(name), { type: 'string' as const }]),
  );
  const { values } = parseArgs({ args: [...argv], options, strict: true });
  const given = Object.fromEntries(
    names.flatMap((name) => {
      const value = values[flagOf(name)] ?? env[envOf(prefix, name)];
      return typeof value === 'string' && value !== '' ? [[name, value]] : [];
    }),
  );
  const parsed = schema.safeParse(given);
  if (parsed.success) return parsed.data;
  const lines = parsed.error.issues.map(({ path, message }) => {
    const name = String(path[0]);
    return `--${flagOf(name)} (or ${envOf(prefix, name)}): ${message}`;
  });
  throw new Error(lines.join('\n'));
}
