import { bigint, customType, datetime } from 'drizzle-orm/mysql-core';

/** Internal key. MariaDB refuses drizzle's `serial()`. */
export const id = () => bigint({ mode: 'number' }).autoincrement().primaryKey();

/** Column that points at an internal key. */
export const ref = () => bigint({ mode: 'number' });

/** A moment in UTC, to the millisecond. */
export const moment = () => datetime({ fsp: 3, mode: 'date' });

/** JSON kept as text: MariaDB's JSON type is LONGTEXT with a check, and mysql2 hands it over unparsed. */
export const jsonText = <T>() =>
  customType<{ data: T; driverData: string }>({
    dataType: () => 'json',
    toDriver: (value) => JSON.stringify(value),
    fromDriver: (value) => (typeof value === 'string' ? (JSON.parse(value) as T) : (value as T)),
  })();
