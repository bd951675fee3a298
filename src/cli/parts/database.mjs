// A MariaDB of our own on the loopback address, with its files in the data folder.
import { createHash } from 'node:crypto';
import { existsSync, mkdirSync, readdirSync, renameSync, rmSync } from 'node:fs';
import { connect } from 'node:net';
import { tmpdir } from 'node:os';
import { setTimeout as pause } from 'node:timers/promises';
import { findCommand } from './commands.mjs';
import { freshLog, tail, writeWhole } from './files.mjs';
import { loopback, tryPort } from './ports.mjs';
import { endPids } from './children.mjs';
import { withArgument } from './process-table.mjs';
import { Stop } from './say.mjs';

const asRoot = () => (process.getuid?.() === 0 ? ['--user=root'] : []);

/** Make the data folder once: beside its place, then renamed, so that half of one is never used. */
export async function makeDatabaseFolder(children, folder) {
  for (const name of readdirSync(folder))
    if (name.startsWith('mariadb.making-')) rmSync(`${folder}/${name}`, { recursive: true });
  const place = `${folder}/mariadb`;
  if (existsSync(`${place}/mysql`)) return 'there';
  rmSync(place, { recursive: true, force: true });
  const making = `${folder}/mariadb.making-${process.pid}`;
  mkdirSync(making, { mode: 0o700 });
  const log = freshLog(`${folder}/logs`, 'mariadb-install');
  const code = await children.run(
    'mariadb-install-db',
    findCommand('mariadb-install-db') ?? 'mariadb-install-db',
    [
      '--no-defaults',
      '--auth-root-authentication-method=normal',
      '--skip-test-db',
      '--skip-name-resolve',
      `--datadir=${making}`,
      ...asRoot(),
    ],
    { log, limit: 180_000 },
  );
  if (code !== 0)
    throw new Stop(
      `MariaDB could not make its data folder in ${place}: see the lines below, put it right and start again.`,
      tail(log),
    );
  renameSync(making, place);
}

/** Tests throw their data away: they need it safe from a killed server, not from a power cut. */
const withoutWaitingForTheDisk = [
  '--innodb-flush-log-at-trx-commit=2',
  '--innodb-flush-method=nosync',
  '--skip-innodb-doublewrite',
  '--debug-no-sync',
];

/** Path of the local socket; the system allows 107 bytes, a long folder gets a short stand-in. */
export function socketPath(folder) {
  const inside = `${folder}/mariadb.sock`;
  if (Buffer.byteLength(inside) <= 107) return inside;
  const short = `${tmpdir()}/mw-${createHash('sha256').update(folder).digest('hex').slice(0, 16)}`;
  mkdirSync(short, { recursive: true, mode: 0o700 });
  return `${short}/mariadb.sock`;
}

/** Statements MariaDB runs before it listens: who may come in, and a fresh database if asked. */
function firstStatements({ databaseRoot, databaseApp }, startOver) {
  const app = `'meterwright'@'${loopback}'`;
  return [
    `DELETE FROM mysql.global_priv WHERE User = '' OR (User = 'root' AND Host <> 'localhost');`,
    'FLUSH PRIVILEGES;',
    `ALTER USER 'root'@'localhost' IDENTIFIED BY '${databaseRoot}';`,
    `CREATE USER IF NOT EXISTS ${app};`,
    `ALTER USER ${app} IDENTIFIED BY '${databaseApp}';`,
    `GRANT ALL ON \`meterwright%\`.* TO ${app};`,
    ...(startOver ? ['DROP DATABASE IF EXISTS meterwright;'] : []),
    'CREATE DATABASE IF NOT EXISTS meterwright;',
    '',
  ].join('\n');
}

/**
 * Start MariaDB on `port` and wait until it answers. `startOver` empties the shop's database
 * first; `lasting: false` trades the power-cut guarantee for speed (tests).
 * @throws Stop with the last lines of its log when it does not come up
 */
export async function startDatabase(children, folder, port, secrets, options = {}) {
  await endStranger(`--datadir=${folder}/mariadb`);
  if ((await tryPort(port)) === undefined)
    throw new Stop(`Port ${port}, kept for MariaDB, is taken: end what listens there, then start.`);
  const log = freshLog(`${folder}/logs`, 'mariadb');
  const socket = socketPath(folder);
  rmSync(socket, { force: true });
  rmSync(`${folder}/mariadb/mariadb.pid`, { force: true });
  const script = `${folder}/mariadb.first.sql`;
  writeWhole(script, firstStatements(secrets, options.startOver), 0o600);
  const entry = children.start(
    'MariaDB',
    findCommand('mariadbd') ?? 'mariadbd',
    [
      '--no-defaults',
      `--datadir=${folder}/mariadb`,
      `--bind-address=${loopback}`,
      `--port=${port}`,
      `--socket=${socket}`,
      `--pid-file=${folder}/mariadb/mariadb.pid`,
      `--init-file=${script}`,
      '--skip-name-resolve',
      '--skip-log-bin',
      '--character-set-server=utf8mb4',
      '--collation-server=utf8mb4_unicode_ci',
      '--sql-mode=STRICT_ALL_TABLES,NO_ZERO_DATE,NO_ZERO_IN_DATE,ERROR_FOR_DIVISION_BY_ZERO,NO_ENGINE_SUBSTITUTION',
      '--default-time-zone=+00:00',
      '--max-connections=300',
      '--max-allowed-packet=64M',
      ...(options.lasting === false ? withoutWaitingForTheDisk : []),
      ...asRoot(),
    ],
    { log, grace: 30_000 },
  );
  await waitUntilItSpeaks(entry, port, folder);
  rmSync(script, { force: true });
  return entry;
}

async function waitUntilItSpeaks(entry, port, folder) {
  for (const until = Date.now() + 60_000; ; await pause(50)) {
    if (!entry.ended && (await greets(port))) return;
    if (entry.ended || Date.now() > until)
      throw new Stop(
        `MariaDB did not start (its files are in ${folder}/mariadb): the last lines of its log say why. ` +
          'Put that right, then start again.',
        lastWords(entry),
      );
  }
}

/** The end of the log without the notes among it, or what the system said. */
function lastWords({ log, error, code }) {
  const lines = tail(log, 40).split('\n');
  const telling = lines.filter((line) => line !== '' && !line.includes('[Note]')).slice(-15);
  return telling.join('\n') || String(error ?? `it ended with ${code} and said nothing`);
}

/** Whether a MariaDB greets on the port: its first packet names protocol version 10. */
function greets(port) {
  return new Promise((resolve) => {
    const line = connect({ port, host: loopback, timeout: 1_000 });
    const answer = (yes) => {
      line.destroy();
      resolve(yes);
    };
    line.once('data', (packet) => answer(packet[4] === 10));
    line.once('error', () => answer(false));
    line.once('timeout', () => answer(false));
    line.once('end', () => answer(false));
  });
}

/** A server left on these very files would hold their lock: end it first. */
async function endStranger(argument) {
  await endPids(withArgument(argument), 30_000);
}
