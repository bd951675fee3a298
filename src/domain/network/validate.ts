import { needsOhms } from './healthy';
import type { Network, NetworkPart, Violation } from './types';

export const MOST_PARTS = 200;
export const MOST_POSITIONS = 50;
/** Between these a resistance makes sense to the computation, Ω. */
const HIGHEST_OHMS = 1e15;

/**
 * Every rule the network breaks, with its path, part and nets; an empty list means that it can be computed.
 * Paths are written as in the API: `parts[2].nets[0]`.
 */
export function violations(network: Network): Violation[] {
  const found: Violation[] = [];
  const positions = new Set<string>();
  network.positions.forEach((position, index) => {
    const path = `positions[${index}]`;
    if (position === '') found.push({ path, message: 'empty name given, a position needs a name' });
    else if (positions.has(position))
      found.push({ path, message: `position ${position} is listed twice, once is needed` });
    positions.add(position);
  });
  if (positions.size > MOST_POSITIONS)
    found.push({
      path: 'positions',
      message: `${positions.size} positions given, ${MOST_POSITIONS} are the most`,
    });
  if (network.parts.length === 0)
    found.push({ path: 'parts', message: 'no part given, at least one is needed' });
  if (network.parts.length > MOST_PARTS)
    found.push({
      path: 'parts',
      message: `${network.parts.length} parts given, ${MOST_PARTS} are the most`,
    });
  const refs = new Map<string, number>();
  network.parts.forEach((part, index) => {
    const first = refs.get(part.ref);
    const path = `parts[${index}]`;
    if (part.ref === '')
      found.push({ path: `${path}.ref`, message: 'empty ref given, a part needs one' });
    else if (first !== undefined)
      found.push({ path: `${path}.ref`, message: `${part.ref} is already parts[${first}]` });
    else refs.set(part.ref, index);
    found.push(...partViolations(part, path, positions));
  });
  return found;
}

function partViolations(
  part: NetworkPart,
  path: string,
  positions: ReadonlySet<string>,
): Violation[] {
  const found: Violation[] = [];
  const say = (field: string, message: string): void => {
    found.push({ path: `${path}.${field}`, message });
  };
  part.nets.forEach((net, end) => {
    if (net === '') say(`nets[${end}]`, `${part.ref} has an end on no net, each end needs one`);
  });
  if (part.nets[0] !== '' && part.nets[0] === part.nets[1])
    say('nets', `${part.ref} has both ends on net ${part.nets[0]}, two different nets are needed`);
  found.push(...valueViolations(part, path));
  if (part.kind !== 'contact') {
    if (part.closed !== undefined && part.closed.length > 0)
      say('closed', `${part.ref} is no contact, only a contact is closed by position`);
    return found;
  }
  if (part.closed === undefined || part.closed.length === 0)
    say(
      'closed',
      `${part.ref} (${part.nets.join(' to ')}) is never closed, one position is needed`,
    );
  part.closed?.forEach((position, at) => {
    if (!positions.has(position))
      say(
        `closed[${at}]`,
        `${part.ref} closes at ${position}, which is no position of the network`,
      );
    else if (part.closed!.indexOf(position) !== at)
      say(`closed[${at}]`, `${part.ref} lists ${position} twice, once is needed`);
  });
  return found;
}

function valueViolations(part: NetworkPart, path: string): Violation[] {
  const found: Violation[] = [];
  const { ohms, tolerance, ref } = part;
  if (ohms === undefined && needsOhms(part.kind))
    found.push({ path: `${path}.ohms`, message: `${ref} has no ohms, a ${part.kind} needs them` });
  if (ohms !== undefined && !(Number.isFinite(ohms) && ohms >= 0 && ohms <= HIGHEST_OHMS))
    found.push({
      path: `${path}.ohms`,
      message: `${ref} has ${ohms} Ω, a number from 0 to ${HIGHEST_OHMS} is needed`,
    });
  if (tolerance !== undefined && !(Number.isFinite(tolerance) && tolerance >= 0 && tolerance < 1))
    found.push({
      path: `${path}.tolerance`,
      message: `${ref} has tolerance ${tolerance}, a fraction from 0 to below 1 is needed`,
    });
  return found;
}
