/**
 * Who may open and post to each page. A page that is not listed here is closed to everybody: the middleware asks
 * this table before any page runs, and the access tests are made from it.
 */
import type { Permission } from '@/domain/people';

type PageWho = Permission | 'public' | 'customer';
export type PageRule = { get: PageWho | null; post?: PageWho };

export const PAGES: Record<string, PageRule> = {
  '/': { get: 'public' },
  '/404': { get: 'public' },
  '/500': { get: 'public' },
  '/api/docs': { get: 'public' },

  // The customer
  '/check': { get: 'public', post: 'public' },
  '/check/link': { get: 'public', post: 'public' },
  '/link/[token]': { get: 'public', post: 'public' },
  '/status': { get: 'customer' },
  '/status/[number]': { get: 'customer', post: 'customer' },

  // Signing in
  '/sign-in': { get: 'public', post: 'public' },
  '/sign-out': { get: null, post: 'public' },
  '/forgot': { get: 'public', post: 'public' },
  '/reset/[token]': { get: 'public', post: 'public' },
  '/invite/[token]': { get: 'public', post: 'public' },
  '/account': { get: 'account.own', post: 'account.own' },
  '/account/second-factor': { get: 'account.own', post: 'account.own' },
  '/account/tokens': { get: 'account.own', post: 'account.own' },

  // The shop
  '/queue': { get: 'ticket.read' },
  '/intake': { get: 'ticket.intake', post: 'ticket.intake' },
  '/tickets/[number]': { get: 'ticket.read', post: 'ticket.read' },
  '/tickets/[number]/edit': { get: 'ticket.intake', post: 'ticket.intake' },
  '/tickets/[number]/tag': { get: 'ticket.intake' },
  '/tickets/[number]/receipt': { get: 'ticket.intake', post: 'ticket.intake' },
  '/instruments/[id]': { get: 'ticket.read' },
  '/faults': { get: 'fault.read' },
  '/faults/new': { get: 'fault.draft' },
  '/faults/review': { get: 'fault.draft' },
  '/faults/[id]': { get: 'fault.read', post: 'fault.draft' },
  '/faults/[id]/edit': { get: 'fault.draft' },
  '/boards': { get: 'board.read' },
  '/boards/[id]': { get: 'board.read' },

  // The owner
  '/people': { get: 'people.manage' },
  '/people/invite': { get: 'people.manage', post: 'people.manage' },
  '/people/[id]': { get: 'people.manage', post: 'people.manage' },
  '/audit': { get: 'audit.read' },
  '/outbox': { get: 'audit.read', post: 'audit.read' },
};
