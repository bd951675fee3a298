// What `npm start` does, step by step, until the shop is open.
import { existsSync } from 'node:fs';
import { startApp } from './app.mjs';
import { ensureBuild, presentBuild } from './build.mjs';
import { missingPackages } from './commands.mjs';
import { needRoom, roomToInstall, roomToRun } from './disk.mjs';
import { beginFirstRun, fill } from './filling.mjs';
import { ensurePackages, packagesAreMissing } from './packages.mjs';
import { dataFolder, root } from './place.mjs';
import { loopback, tryPort } from './ports.mjs';
import { oneRun } from './run.mjs';
import { say, seconds, sayWhy, step, Stop } from './say.mjs';
import { databaseCommands, installServices, startServices } from './services.mjs';
import { broughtAlong } from './settings.mjs';
import { keepRunning } from './supervise.mjs';

/** Open the shop and keep it open until asked to end. Answers the exit code. */
export async function openShop({ dev }) {
  const since = performance.now();
  if (existsSync(`${root}/.env`)) process.loadEnvFile(`${root}/.env`);
  const given = { ...process.env, ...(dev ? { NODE_ENV: 'development' } : {}) };
  say('Meterwright');
  try {
    const folder = dataFolder();
    return await oneRun({ folder, lockFile: 'start.lock', purpose: 'Meterwright' }, (run) =>
      work({ ...run, given, dev, since }),
    );
  } catch (error) {
    sayWhy(error);
    return 1;
  }
}

async function work({ children, folder, given, dev, since, untilEnd, ready }) {
  const port = await wantedPort(given);
  await step('Free space', () => checkRoom(folder, given));
  await installServices(children, given);
  await step('Packages (npm ci)', () => ensurePackages(children));
  let entry;
  if (!dev) {
    const { there } = presentBuild();
    await step('Build', async () => {
      entry = await ensureBuild(children);
      return there ? 'there' : 'built';
    });
  }
  const startOver = beginFirstRun(folder, given);
  const { env, running } = await startServices(children, folder, { given, startOver });
  await fill(children, folder, given, env);
  const again = () => startApp(children, folder, env, entry);
  await step(`Serving on port ${port}`, async () => {
    if ((await tryPort(port)) === undefined) throw portTaken(port);
    running.push({ name: 'The app', entry: await again(), again });
  });
  ready();
  sayOpen(env, since);
  let ending = false;
  const watched = running.map((service) => keepRunning(service, () => ending));
  await Promise.race([untilEnd, ...watched]);
  ending = true;
}

async function wantedPort(given) {
  const port = Number(given.PORT || 4321);
  if (!Number.isInteger(port) || port < 1 || port > 65535)
    throw new Stop(`PORT is "${given.PORT}"; a number from 1 to 65535 is needed.`);
  if ((await tryPort(port)) === undefined) throw portTaken(port);
  return port;
}

const portTaken = (port) =>
  new Stop(
    `Port ${port} is taken: end the program that listens on ${loopback}:${port}, or choose another port, for example: PORT=${port + 1} npm start`,
  );

function checkRoom(folder, given) {
  const programs = broughtAlong(given).database ? [] : missingPackages(databaseCommands);
  const first = packagesAreMissing() || programs.length > 0;
  const needed = first ? roomToInstall : roomToRun;
  needRoom(root, needed);
  return needRoom(folder, needed);
}

function sayOpen(env, since) {
  const lines = [
    ['Open at', env.PUBLIC_ORIGIN],
    ...(env.MAIL_INBOX_URL ? [['Mail it sends', env.MAIL_INBOX_URL]] : []),
  ];
  if (env.DEMO === '1') {
    const people = ['counter', 'tech', 'senior', 'owner'];
    lines.push(['Sign in as', people.map((who) => `${who}@meterwright.example`).join(', ')]);
    lines.push(['Password', 'bench-demo-2612']);
  }
  say(`\nThe shop is open after ${seconds(since)}. Ctrl-C ends everything started here.\n`);
  for (const [what, text] of lines) say(`  ${what.padEnd(14)} ${text}`);
}
