// Every process a run starts: recorded on disk while it lives, ended with all that it started itself.
import { spawn } from 'node:child_process';
import { closeSync, openSync } from 'node:fs';
import { setTimeout as pause } from 'node:timers/promises';
import { readJson, writeWhole } from './files.mjs';
import {
  groupMembers,
  identify,
  markName,
  markOf,
  markedWith,
  stillLives,
} from './process-table.mjs';

/**
 * The children of one run. Each gets a process group of its own, so that Ctrl-C in the terminal
 * reaches only this process, which then ends them in the reverse of the order they were started.
 */
export function manageChildren(folder, runId) {
  const record = `${folder}/children.json`;
  let living = [];
  let ending = false;

  // A full disk must not keep a child from being ended; a run is also found again by its mark.
  const save = (children = living.map(described)) => {
    try {
      writeWhole(record, JSON.stringify({ runId, children }, null, 2), 0o600);
    } catch (error) {
      if (error.code !== 'ENOSPC') throw error;
    }
  };

  /** Start a program; its output goes to `log`, or to the terminal when there is none. */
  function start(name, command, args, { env = {}, cwd, log, grace = 10_000, input } = {}) {
    if (ending) throw new Error(`${name}: the run is ending`);
    const output = log === undefined ? 'inherit' : openSync(log, 'a');
    const child = spawn(command, args, {
      cwd,
      env: { ...process.env, ...env, [markName]: markOf(runId) },
      stdio: [input ?? 'ignore', output, output],
      detached: true,
    });
    if (typeof output === 'number') closeSync(output);
    const entry = { name, child, grace, log, ended: false, code: undefined };
    entry.exit = new Promise((resolve) => {
      const over = (code, error) => {
        Object.assign(entry, { ended: true, code, error });
        living = living.filter((other) => other !== entry);
        if (!ending) save();
        resolve(entry);
      };
      child.once('error', (error) => over(127, error));
      child.once('exit', (code, signal) => over(code ?? signal));
    });
    if (child.pid !== undefined) {
      entry.identity = identify(child.pid);
      living.push(entry);
      save();
    }
    return entry;
  }

  /** Run a program to its end; answers its exit code (127 when it could not be started). */
  async function run(name, command, args, { limit, ...options } = {}) {
    const entry = start(name, command, args, options);
    const timer = limit && setTimeout(() => void end(entry), limit);
    await entry.exit;
    clearTimeout(timer);
    return entry.code;
  }

  const end = (entry) => endGroup(entry.child.pid, entry.grace);

  async function endAll() {
    ending = true;
    for (const entry of [...living].reverse()) await end(entry);
    await endPids(markedWith(runId));
    save([]);
  }

  return { start, run, end, endAll, folder };
}

const described = ({ name, grace, identity }) => ({ name, grace, ...identity });

/** Ask a process group to end, insist after `grace` milliseconds, and wait until it is gone. */
export async function endGroup(group, grace) {
  signal(-group, 'SIGTERM');
  const until = Date.now() + grace;
  for (let wait = 10; groupMembers(group).length > 0; wait = Math.min(wait * 2, 200)) {
    if (Date.now() > until) signal(-group, 'SIGKILL');
    await pause(wait);
  }
}

/** The same for single processes, by number; each is watched by who it was when asked. */
export async function endPids(pids, grace = 5_000) {
  const records = pids.map(identify).filter(Boolean);
  for (const { pid } of records) signal(pid, 'SIGTERM');
  const until = Date.now() + grace;
  for (let left = records; left.length > 0; left = left.filter(stillLives)) {
    if (Date.now() > until) for (const { pid } of left) signal(pid, 'SIGKILL');
    await pause(50);
  }
}

function signal(pid, name) {
  try {
    process.kill(pid, name);
  } catch (error) {
    if (error.code !== 'ESRCH') throw error;
  }
}

/**
 * End what the killed run `runId` left running on this folder: recorded children whose number, start time
 * and command line all still agree, then whatever else carries that run's mark.
 * Answers the names of the children found alive.
 */
export async function endLeftOvers(folder, runId) {
  const { children = [] } = readJson(`${folder}/children.json`, {});
  const left = children.filter(stillLives).reverse();
  for (const child of left) await endGroup(child.pid, child.grace ?? 10_000);
  const strays = runId ? markedWith(runId) : [];
  await endPids(strays);
  return [...left.map((child) => child.name), ...strays.map((pid) => `process ${pid}`)];
}
