/**
 * `tsx src/cli/first-owner.ts email "Name"`: invites the first owner of a new shop and prints the one-time link.
 * Does nothing once an owner exists.
 */
import { migrateDatabase } from '@/db/migrate';
import { openDatabase } from '@/db/client';
import { Email } from '@/contracts/common';
import { inviteFirstOwner } from '@/server/people/first-owner';
import { readSettings } from '@/server/settings';

const [, , email = '', name = ''] = process.argv;
const address = Email.safeParse(email);
if (!address.success || name.trim() === '') {
  console.error('Usage: tsx src/cli/first-owner.ts owner@your-shop.example "Their name"');
  process.exit(1);
}
const settings = readSettings(process.env);
await migrateDatabase(settings.databaseUrl);
const { db, pool } = openDatabase(settings.databaseUrl, 2);
const invited = await inviteFirstOwner(db, { email: address.data, name: name.trim() }, new Date());
await pool.end();
if (!invited.ok) {
  console.error(invited.reason);
  process.exit(1);
}
console.log(
  `Open this within seven days to choose a password:\n${settings.origin}/invite/${invited.value}`,
);
