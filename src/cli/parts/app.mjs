// The app as a process: started with its settings, waited for until it says it is ready.
import { setTimeout as pause } from 'node:timers/promises';
import { freshLog, tail } from './files.mjs';
import { root } from './place.mjs';
import { loopback } from './ports.mjs';
import { Stop } from './say.mjs';

/** Start the built app, or Astro's development server when `entry` is undefined. */
export async function startApp(children, folder, env, entry) {
  const log = freshLog(`${folder}/logs`, 'app');
  const words = entry
    ? [entry]
    : [`${root}/node_modules/astro/astro.js`, 'dev', '--host', env.HOST, '--port', env.PORT];
  const quiet = { ASTRO_TELEMETRY_DISABLED: '1', ASTRO_DISABLE_UPDATE_CHECK: 'true' };
  const app = children.start('app', process.execPath, words, {
    cwd: root,
    log,
    env: { ...env, ...quiet },
  });
  await untilReady(app, `http://${reachable(env.HOST)}:${env.PORT}/api/health/ready`);
  return app;
}

/** A host to ask the app on, for the host it listens on. */
function reachable(host) {
  if (host === '0.0.0.0' || host === '::') return loopback;
  return host.includes(':') ? `[${host}]` : host;
}

/** Wait for 200 from the readiness address. @throws Stop with the app's last lines */
export async function untilReady(app, address, limit = 90_000) {
  let last = 'no answer';
  for (const until = Date.now() + limit; ; await pause(100)) {
    if (app.ended)
      throw new Stop(`The app ended with ${app.code} before it was ready.`, tail(app.log, 25));
    try {
      const answer = await fetch(address, { signal: AbortSignal.timeout(10_000) });
      const body = await answer.text();
      if (answer.status === 200) return;
      last = `${answer.status} ${body.slice(0, 300)}`;
    } catch (error) {
      last = String(error.cause?.code ?? error.message);
    }
    if (Date.now() > until)
      throw new Stop(
        `The app was not ready within ${limit / 1000} s; ${address} last said: ${last}`,
        tail(app.log, 25),
      );
  }
}
