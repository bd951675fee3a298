// `node src/cli/dev-services.mjs`: MariaDB, object store and mail catcher for development, with
// their settings in `.data/dev.env`. Runs until Ctrl-C; a second one says where the first is.
// `--without store,mail` (or `database`) leaves some out.
import { existsSync, mkdirSync, readFileSync, rmSync } from 'node:fs';
import { parseArgs } from 'node:util';
import { writeWhole } from './parts/files.mjs';
import { cacheFolder } from './parts/place.mjs';
import { oneRun } from './parts/run.mjs';
import { say, sayWhy } from './parts/say.mjs';
import { installServices, startServices } from './parts/services.mjs';

const { values: options } = parseArgs({ options: { without: { type: 'string', default: '' } } });
const folder = `${cacheFolder}/dev`;
const envFile = `${cacheFolder}/dev.env`;
mkdirSync(`${folder}/logs`, { recursive: true });

const asLines = (env) =>
  Object.entries(env)
    .filter(([, value]) => value !== undefined)
    .map(([name, value]) => `${name}="${value}"\n`)
    .join('');

async function work({ children, untilEnd, ready }) {
  const given = { PORT: process.env.PORT ?? '4321', NODE_ENV: 'development', LOG_LEVEL: 'debug' };
  await installServices(children, given);
  const { env, ports } = await startServices(children, folder, {
    given,
    lasting: false,
    without: options.without.split(','),
  });
  const controls = {
    S3_CONTROL_URL: `http://127.0.0.1:${ports.storeControl}`,
    MAIL_CONTROL_URL: `http://127.0.0.1:${ports.mailControl}`,
  };
  writeWhole(envFile, asLines({ ...env, ...controls }), 0o600);
  ready();
  say(`\nRunning; settings are in ${envFile}. Ctrl-C ends them.`);
  await untilEnd;
}

try {
  process.exitCode = await oneRun(
    { folder, lockFile: 'services.lock', purpose: 'The set of development services' },
    work,
  );
  rmSync(envFile, { force: true });
} catch (error) {
  if (error.alreadyRunning && existsSync(envFile)) {
    say(`Already running; settings are in ${envFile}:\n\n${readFileSync(envFile, 'utf8')}`);
  } else {
    sayWhy(error);
    process.exitCode = 1;
  }
}
process.exit();
