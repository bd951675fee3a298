/** The pages of one's own account, and those of the owner, in the order they are shown. */

export const ACCOUNT_PAGES = [
  { href: '/account', label: 'You' },
  { href: '/account/second-factor', label: 'Second factor' },
  { href: '/account/tokens', label: 'API tokens' },
] as const;

export const OWNER_PAGES = [
  { href: '/people', label: 'People' },
  { href: '/audit', label: 'Audit log' },
  { href: '/outbox', label: 'Outbox' },
] as const;
