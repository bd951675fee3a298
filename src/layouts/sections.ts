/** The staff's sections in the order they stand on the navigation's scale. */

import type { StaffRole } from '@/domain/people';

export interface SignedIn {
  readonly name: string;
  readonly role: StaffRole;
}

interface Section {
  readonly key: string;
  readonly label: string;
  readonly href: string;
  /** Only these roles see it; everyone when left out. */
  readonly roles?: readonly StaffRole[];
}

export const SECTIONS = [
  { key: 'queue', label: 'Queue', href: '/queue' },
  { key: 'intake', label: 'Intake', href: '/intake' },
  { key: 'faults', label: 'Fault base', href: '/faults' },
  { key: 'boards', label: 'Boards', href: '/boards' },
  { key: 'people', label: 'People', href: '/people', roles: ['owner'] },
] as const satisfies readonly Section[];

export type SectionKey = (typeof SECTIONS)[number]['key'];

/** The sections a person of this role is shown. */
export function sectionsFor(role: StaffRole): readonly Section[] {
  const all: readonly Section[] = SECTIONS;
  return all.filter(({ roles }) => roles === undefined || roles.includes(role));
}
