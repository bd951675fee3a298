// The local stand-ins for the object store and the mail service.
import { mkdirSync } from 'node:fs';
import { connect } from 'node:net';
import { setTimeout as pause } from 'node:timers/promises';
import { freshLog, tail } from './files.mjs';
import { root } from './place.mjs';
import { loopback } from './ports.mjs';
import { Stop } from './say.mjs';

const scripts = {
  store: `${root}/fakes/object-store/serve.ts`,
  mail: `${root}/fakes/mail-catcher/serve.ts`,
};

/** Start the object store and wait until it accepts connections. */
export async function startStore(children, folder, ports, secrets) {
  const entry = startFake(children, folder, 'object store', 'object-store', scripts.store, {
    port: ports.store,
    'control-port': ports.storeControl,
    data: `${folder}/object-store`,
    key: secrets.storeKey,
    secret: secrets.storeSecret,
  });
  await untilItListens(entry, ports.store);
  return entry;
}

/** Start the mail catcher and wait until it accepts mail. */
export async function startMailCatcher(children, folder, ports) {
  const entry = startFake(children, folder, 'mail catcher', 'mail-catcher', scripts.mail, {
    port: ports.smtp,
    'http-port': ports.inbox,
    'control-port': ports.mailControl,
    data: `${folder}/mail-catcher`,
  });
  await untilItListens(entry, ports.smtp);
  await untilItListens(entry, ports.inbox);
  return entry;
}

function startFake(children, folder, name, short, script, options) {
  mkdirSync(options.data, { recursive: true });
  const log = freshLog(`${folder}/logs`, short);
  const words = Object.entries(options).flatMap(([key, value]) => [`--${key}`, String(value)]);
  return children.start(name, process.execPath, ['--import', 'tsx', script, ...words], {
    cwd: root,
    log,
    grace: 5_000,
  });
}

/** Wait until something accepts connections on the port, or the process that should is over. */
export async function untilItListens(entry, port) {
  for (const until = Date.now() + 60_000; ; await pause(50)) {
    if (!entry.ended && (await accepts(port))) return;
    if (entry.ended || Date.now() > until)
      throw new Stop(
        `The ${entry.name} did not start: the last lines of its log say why.`,
        tail(entry.log) || String(entry.error ?? `it ended with ${entry.code} and said nothing`),
      );
  }
}

function accepts(port) {
  return new Promise((resolve) => {
    const line = connect({ port, host: loopback, timeout: 1_000 });
    const answer = (yes) => {
      line.destroy();
      resolve(yes);
    };
    line.once('connect', () => answer(true));
    line.once('error', () => answer(false));
    line.once('timeout', () => answer(false));
  });
}
