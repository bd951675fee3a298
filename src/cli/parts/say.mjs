// What the person at the terminal reads: one line a step, with the time it took.
import { writeSync } from 'node:fs';
import { dirname } from 'node:path';

/**
 * Something the person has to put right. `sentence` says what to do; `detail` is shown below it
 * as it came (the last lines of a log).
 */
export class Stop extends Error {
  constructor(sentence, detail = '') {
    super(sentence);
    this.name = 'Stop';
    this.detail = detail;
  }
}

let lineOpen = false;
let stream = 1;

/** Send all progress to standard error, so that standard output carries data alone. */
export function sayOnStandardError() {
  stream = 2;
}

function write(text) {
  try {
    writeSync(stream, text);
  } catch {
    // The terminal went away (EPIPE, EIO) or is slow (EAGAIN): the work goes on without it.
  }
}

/** Print a line of its own. */
export function say(line = '') {
  write(`${lineOpen ? '\n' : ''}${line}\n`);
  lineOpen = false;
}

/**
 * Run one step, printing its name, then how it ended and how long it took. The work may return a
 * short text that is printed instead of "done".
 */
export async function step(name, work) {
  const since = performance.now();
  write(`${lineOpen ? '\n' : ''}  ${name} … `);
  lineOpen = true;
  const ended = (word) => {
    write(`${lineOpen ? '' : `  ${name}: `}${word} (${seconds(since)})\n`);
    lineOpen = false;
  };
  try {
    const result = await work();
    ended(typeof result === 'string' ? result : 'done');
    return result;
  } catch (error) {
    ended('failed');
    throw error;
  }
}

/** Elapsed time since a `performance.now()`, for people: `1.2 s`. */
export const seconds = (since) => `${((performance.now() - since) / 1000).toFixed(1)} s`;

/** Print why the command ends: a `Stop` in its sentence, anything else with its stack. */
export function sayWhy(error) {
  if (error instanceof Stop) {
    say(`\n${error.message}`);
    if (error.detail) say(`\n${indent(error.detail)}`);
  } else if (error?.code === 'ENOSPC') {
    say('\nThe disk is full: free some space, then run the command again.');
  } else if (['EACCES', 'EPERM', 'EROFS'].includes(error?.code) && error.path) {
    say(
      `\nThis user may not write in ${dirname(error.path)}: give this user the folder, then start again.`,
    );
  } else {
    say(`\n${error?.stack ?? error}`);
  }
}

const indent = (text) => text.trimEnd().replace(/^/gm, '    ');
