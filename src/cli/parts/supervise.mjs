// A service that dies while the shop is open is started again, a few times.
import { setTimeout as pause } from 'node:timers/promises';
import { tail } from './files.mjs';
import { say, Stop } from './say.mjs';

const waits = [1_000, 2_000, 5_000, 10_000, 20_000];
const longEnough = 300_000;

/**
 * Watch a started service `{name, entry, again}`; settles never while it can be kept running.
 * @throws Stop when it keeps ending
 */
export async function keepRunning(service, isEnding) {
  let tries = 0;
  for (;;) {
    const since = Date.now();
    const ended = await service.entry.exit;
    if (isEnding()) return;
    if (Date.now() - since > longEnough) tries = 0;
    service.entry = await startedAgain(service, ended, tries, isEnding);
    tries += 1;
  }
}

async function startedAgain(service, ended, tries, isEnding) {
  let lastWords = tail(ended.log);
  say(`  ${service.name} ended by itself (${ended.code ?? ended.error}).`);
  for (const wait of waits.slice(tries)) {
    await pause(wait);
    if (isEnding()) return ended;
    try {
      const entry = await service.again();
      say(`  ${service.name} is running again.`);
      return entry;
    } catch (error) {
      lastWords = error.detail || String(error);
      say(`  ${service.name} could not be started again yet.`);
    }
  }
  throw new Stop(`${service.name} keeps ending, so the shop is closed.`, lastWords);
}
