// The local stand-ins for the object store and the mail service.
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
export async function startStore(children, folder, ports, env) {
  const entry = startFake(children, folder, 'object store', 'object-store', scripts.store, {
    FAKE_STORE_PORT: ports.store,
    FAKE_STORE_CONTROL_PORT: ports.storeControl,
    FAKE_STORE_DATA: `${folder}/object-store`,
    FAKE_STORE_REGION: env.S3_REGION,
    FAKE_STORE_BUCKETS: env.S3_BUCKET,
    FAKE_STORE_KEY: env.S3_KEY,
    FAKE_STORE_SECRET: env.S3_SECRET,
  });
  await untilItListens(entry, ports.store);
  return entry;
}

/** Start the mail catcher and wait until it accepts mail. */
export async function startMailCatcher(children, folder, ports) {
  const entry = startFake(children, folder, 'mail catcher', 'mail-catcher', scripts.mail, {
    FAKE_MAIL_PORT: ports.smtp,
    FAKE_MAIL_HTTP_PORT: ports.inbox,
    FAKE_MAIL_CONTROL_PORT: ports.mailControl,
    FAKE_MAIL_DATA: `${folder}/mail-catcher`,
  });
  await untilItListens(entry, ports.smtp);
  await untilItListens(entry, ports.inbox);
  return entry;
}

/** Settings go by the environment: a command line can be read by everybody on the machine. */
function startFake(children, folder, name, short, script, settings) {
  const log = freshLog(`${folder}/logs`, short);
  const env = Object.fromEntries(Object.entries(settings).map(([key, v]) => [key, String(v)]));
  return children.start(name, process.execPath, ['--import', 'tsx', script], {
    cwd: root,
    log,
    env,
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
