// Who a process is, from /proc: a number alone is not enough, the system gives it out again.
import { readdirSync, readFileSync } from 'node:fs';

/** Name of the variable that marks every process of a run, and all that those start. */
export const markName = 'METERWRIGHT_RUN';

/** Value of the mark for a run inside whatever run this process itself belongs to. */
export const markOf = (runId) => [process.env[markName], runId].filter(Boolean).join(':');

function read(path) {
  try {
    return readFileSync(path, 'utf8');
  } catch {
    return undefined;
  }
}

/** Fields of /proc/<pid>/stat from the state on; the name before it may hold any character. */
function stat(pid) {
  const text = read(`/proc/${pid}/stat`);
  return text?.slice(text.lastIndexOf(')') + 2).split(' ');
}

const gone = (fields) => fields === undefined || fields[0] === 'Z' || fields[0] === 'X';

/** This start of the machine; process start times are counted from it. */
export const machineStart = () => (read('/proc/sys/kernel/random/boot_id') ?? '').trim();

/**
 * A living process as `{pid, startTime, commandLine, boot}`, or undefined. `startTime` is in clock
 * ticks since the machine started (proc(5), field 22). Zombies count as gone.
 */
export function identify(pid) {
  const fields = stat(pid);
  if (gone(fields)) return undefined;
  const commandLine = (read(`/proc/${pid}/cmdline`) ?? '').replaceAll('\0', ' ').trim();
  return { pid, startTime: fields[19], commandLine, boot: machineStart() };
}

/** Whether the process described by an earlier `identify` still lives. */
export function stillLives(record) {
  const now = identify(record?.pid);
  return (
    now !== undefined &&
    now.startTime === record.startTime &&
    now.boot === record.boot &&
    (record.commandLine === undefined || now.commandLine === record.commandLine)
  );
}

/** The nearest process above this one whose command line fits, or undefined. */
export function findAncestor(pattern) {
  for (let pid = process.ppid; pid > 1; pid = Number(stat(pid)?.[1] ?? 0)) {
    const record = identify(pid);
    if (record && pattern.test(record.commandLine)) return record;
  }
  return undefined;
}

function everyPid() {
  return readdirSync('/proc')
    .filter((name) => /^\d+$/.test(name))
    .map(Number);
}

/** Living members of a process group. */
export const groupMembers = (group) =>
  everyPid().filter((pid) => {
    const fields = stat(pid);
    return !gone(fields) && Number(fields[2]) === group;
  });

/** Living processes that carry the mark of a run, this one excepted. */
export const markedWith = (runId) =>
  everyPid().filter((pid) => {
    if (pid === process.pid || gone(stat(pid))) return false;
    const mark = read(`/proc/${pid}/environ`)
      ?.split('\0')
      .find((entry) => entry.startsWith(`${markName}=`));
    return (
      mark !== undefined &&
      mark
        .slice(markName.length + 1)
        .split(':')
        .includes(runId)
    );
  });

/** Living processes with exactly this argument on their command line. */
export const withArgument = (argument) =>
  everyPid().filter((pid) => {
    if (gone(stat(pid))) return false;
    return (read(`/proc/${pid}/cmdline`) ?? '').split('\0').includes(argument);
  });
