import type { Settings } from './settings';
import type { Shop } from './tickets/types';

/** What commands are told of the shop. */
export const shopOf = (settings: Settings): Shop => ({
  ...settings.shop,
  origin: settings.origin,
  secret: settings.secret,
});
