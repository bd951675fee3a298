// The frame of every command: lock, recovery, signals, and the end of all that was started.
import { endLeftOvers, manageChildren } from './children.mjs';
import { takeLock } from './lock.mjs';
import { findAncestor, stillLives } from './process-table.mjs';
import { say, sayWhy, Stop } from './say.mjs';

/**
 * Run `work({children, folder, untilEnd, ready})` as the one run on `folder`, then end everything
 * it started, whatever happened. `untilEnd` settles when the person asks to end (Ctrl-C, SIGTERM,
 * terminal or npm gone); the work calls `ready()` when being asked to end is no longer a failure.
 * Answers the exit code: the work's own (0 when it answers nothing), 1 when it threw.
 */
export async function oneRun({ folder, lockFile, purpose }, work) {
  if (process.platform !== 'linux')
    throw new Stop('Meterwright runs on Linux: Debian 12 or later.');
  const lock = await takeLock(folder, lockFile, purpose);
  const asked = watchForEnd();
  const left = await endLeftOvers(folder, lock.stale?.runId);
  if (lock.stale || left.length > 0) sayWhatWasLeft(left);
  const children = manageChildren(folder, lock.runId);
  const ready = () => (asked.ready = true);
  let code;
  try {
    const worked = work({ children, folder, untilEnd: asked.promise, ready });
    code = await Promise.race([worked, asked.promise, unexpected()]);
  } catch (error) {
    code = 1;
    if (!asked.reason) sayWhy(error);
  }
  if (asked.reason) say(`\n${asked.reason}: ending what was started.`);
  await children.endAll();
  lock.release();
  if (asked.reason) return asked.ready ? 0 : 130;
  return code ?? 0;
}

/** Rejects with an error nobody waits for, so that it too ends what was started. */
const unexpected = () => new Promise((_, reject) => process.on('uncaughtException', reject));

function sayWhatWasLeft(left) {
  say(
    left.length > 0
      ? `  An earlier run was cut off; ended what it left: ${left.join(', ')}.`
      : '  An earlier run was cut off; nothing of it is left running.',
  );
}

function watchForEnd() {
  const asked = { reason: undefined, ready: false, promise: undefined };
  asked.promise = new Promise((resolve) => {
    const ask = (reason) => {
      asked.reason ??= reason;
      resolve();
    };
    process.on('SIGINT', () => ask('Ctrl-C'));
    process.on('SIGTERM', () => ask('Asked to end'));
    process.on('SIGHUP', () => ask('The terminal is gone'));
    // npm killed outright passes no signal on.
    const npm = findAncestor(/^npm /);
    if (npm)
      setInterval(() => {
        if (!stillLives(npm)) ask('npm is gone');
      }, 1_000).unref();
  });
  return asked;
}
