/** Who uses the shop's tool, and what each role may do: the one table that pages, endpoints and e-mails ask. */

export const STAFF_ROLES = ['counter', 'technician', 'senior', 'owner'] as const;
export type StaffRole = (typeof STAFF_ROLES)[number];
export const ROLES = ['customer', ...STAFF_ROLES] as const;
export type Role = (typeof ROLES)[number];

/** What a token may be used for; each permission belongs to one scope. */
export const SCOPES = ['read', 'bench', 'desk', 'admin'] as const;
export type Scope = (typeof SCOPES)[number];

const everyone = STAFF_ROLES;
const bench = ['technician', 'senior', 'owner'] as const;
const seniors = ['senior', 'owner'] as const;
const owner = ['owner'] as const;

/** Permission → the roles that hold it and the token scope it needs. */
export const PERMISSIONS = {
  'ticket.read': { roles: everyone, scope: 'read' },
  'ticket.intake': { roles: everyone, scope: 'desk' },
  /** Correcting what was written down of a ticket that is closed. */
  'ticket.amend': { roles: seniors, scope: 'desk' },
  'ticket.step': { roles: everyone, scope: 'desk' },
  'ticket.message': { roles: everyone, scope: 'desk' },
  'ticket.bench': { roles: bench, scope: 'bench' },
  'compute.use': { roles: everyone, scope: 'read' },
  'fault.read': { roles: everyone, scope: 'read' },
  'fault.draft': { roles: bench, scope: 'bench' },
  'fault.publish': { roles: seniors, scope: 'bench' },
  'board.read': { roles: everyone, scope: 'read' },
  'board.edit': { roles: seniors, scope: 'bench' },
  'exception.sign': { roles: seniors, scope: 'bench' },
  'people.manage': { roles: owner, scope: 'admin' },
  'audit.read': { roles: owner, scope: 'admin' },
  'account.own': { roles: everyone, scope: 'admin' },
} as const satisfies Record<string, { roles: readonly StaffRole[]; scope: Scope }>;

export type Permission = keyof typeof PERMISSIONS;

/** True when a member of staff with this role holds the permission. */
export function roleMay(role: Role, permission: Permission): boolean {
  return (PERMISSIONS[permission].roles as readonly Role[]).includes(role);
}

/**
 * What a token of this role may be given: the scopes of the permissions the role holds. Looking after one's own
 * account is left out, as it is done signed in and never by token.
 */
export function scopesFor(role: Role): Scope[] {
  const held = Object.entries(PERMISSIONS).filter(
    ([name, { roles }]) => name !== 'account.own' && (roles as readonly Role[]).includes(role),
  );
  return SCOPES.filter((scope) => held.some(([, permission]) => permission.scope === scope));
}

/** What each scope lets a token do, in words. */
export const SCOPE_WORDS: Readonly<Record<Scope, string>> = {
  read: 'See tickets, boards, fault notes; use the calculators',
  bench: 'Readings, photos, fault notes, board files',
  desk: 'Intake, steps, messages',
  admin: 'People and the audit log',
};
