/** The letters the shop sends to its own people. */
import type { StaffRole } from '@/domain/people';
import type { Mail } from '../outbox/commands';
import type { Shop } from '../tickets/types';

type Colleague = { name: string; email: string };

export function invitationMail(
  shop: Shop,
  to: Colleague & { role: StaffRole },
  from: string,
  token: string,
): Mail {
  return {
    to: to.email,
    subject: `${from} invites you to the bench of ${shop.name}`,
    text: `Dear ${to.name},

${from} made you an account as ${to.role} at ${shop.name}. Choose your password here; the link works
once, for seven days:
${shop.origin}/invite/${token}

If you do not know what this is about, leave it: without the link nobody gets in.

${shop.name}
${shop.address}
`,
  };
}

export function resetMail(shop: Shop, to: Colleague, token: string): Mail {
  return {
    to: to.email,
    subject: `A new password for ${shop.name}`,
    text: `Dear ${to.name},

somebody, most likely you, asked for a new password. Choose it here; the link works once, for an hour:
${shop.origin}/reset/${token}

If it was not you, leave it: your password stays as it is.

${shop.name}
${shop.address}
`,
  };
}

/** Told after the fact, so that a change by somebody else does not go unnoticed. */
export function passwordChangedMail(shop: Shop, to: Colleague, tokensRevoked: number): Mail {
  const tokens = tokensRevoked > 0 ? ' Your API tokens were revoked.' : '';
  return {
    to: to.email,
    subject: `Your password for ${shop.name} was changed`,
    text: `Dear ${to.name},

your password was changed just now, and your other sessions were ended.${tokens}

If it was not you, ask for a new one at once and tell the owner:
${shop.origin}/forgot

${shop.name}
${shop.address}
`,
  };
}
