/** Who asks. Only this folder makes these values; a `Granted` is the proof that a permission was checked. */
import { PERMISSIONS, roleMay, type Permission, type Scope, type StaffRole } from '@/domain/people';

export type StaffActor = {
  kind: 'staff';
  id: number;
  name: string;
  email: string;
  role: StaffRole;
  /** The scopes of the token used; null for a session. */
  scopes: readonly Scope[] | null;
};

export type CustomerActor = {
  kind: 'customer';
  id: number;
  name: string;
  role: 'customer';
  customerId: number;
  /** Set when the session came from a claim code: that ticket alone. */
  ticketId: number | null;
};

export type Actor = StaffActor | CustomerActor;

declare const granted: unique symbol;
/** A member of staff whose permission was checked; only `grant` makes it. */
export type Granted<P extends Permission> = StaffActor & { readonly [granted]: P };

/** The proof that this actor holds the permission (and, with a token, its scope), or null. */
export function grant<P extends Permission>(actor: Actor | null, permission: P): Granted<P> | null {
  if (actor?.kind !== 'staff') return null;
  if (!roleMay(actor.role, permission)) return null;
  if (actor.scopes && !actor.scopes.includes(PERMISSIONS[permission].scope)) return null;
  return actor as Granted<P>;
}
