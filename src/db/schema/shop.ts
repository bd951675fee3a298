import {
  boolean,
  double,
  index,
  int,
  mysqlEnum,
  mysqlTable,
  text,
  uniqueIndex,
  varchar,
} from 'drizzle-orm/mysql-core';
import { PART_KINDS } from '@/domain/parts/kinds';
import { id, jsonText, moment, ref } from '../columns';

export const customers = mysqlTable(
  'customers',
  {
    id: id(),
    name: varchar({ length: 120 }).notNull(),
    email: varchar({ length: 190 }),
    phone: varchar({ length: 40 }),
    address: varchar({ length: 300 }),
    createdAt: moment().notNull(),
    version: int().notNull().default(1),
  },
  (t) => [index('customers_email').on(t.email), index('customers_name').on(t.name)],
);

/** The circuit board inside, with its revision marking; what the shop knows of it hangs here. */
export const boards = mysqlTable(
  'boards',
  {
    id: id(),
    code: varchar({ length: 40 }).notNull(),
    revision: varchar({ length: 20 }).notNull(),
    maker: varchar({ length: 80 }).notNull(),
    about: text().notNull(),
    /** Switch positions in the order of the dial. */
    positions: jsonText<string[]>().notNull(),
    createdAt: moment().notNull(),
    version: int().notNull().default(1),
  },
  (t) => [uniqueIndex('boards_code').on(t.code, t.revision)],
);

/** The label on the case; several models may carry one board. */
export const models = mysqlTable(
  'models',
  {
    id: id(),
    maker: varchar({ length: 80 }).notNull(),
    name: varchar({ length: 80 }).notNull(),
    category: varchar({ length: 80 }).notNull().default(''),
    boardId: ref().references(() => boards.id),
    createdAt: moment().notNull(),
    version: int().notNull().default(1),
  },
  (t) => [uniqueIndex('models_label').on(t.maker, t.name), index('models_board').on(t.boardId)],
);

export const boardNets = mysqlTable(
  'board_nets',
  {
    id: id(),
    boardId: ref()
      .notNull()
      .references(() => boards.id),
    name: varchar({ length: 40 }).notNull(),
    /** What a technician sees: "V jack", "pad beside Q3". */
    label: varchar({ length: 120 }).notNull().default(''),
    /** Can a probe reach it. */
    probe: boolean().notNull().default(true),
    place: int().notNull(),
  },
  (t) => [uniqueIndex('board_nets_name').on(t.boardId, t.name)],
);

export const boardParts = mysqlTable(
  'board_parts',
  {
    id: id(),
    boardId: ref()
      .notNull()
      .references(() => boards.id),
    ref: varchar({ length: 20 }).notNull(),
    kind: mysqlEnum(PART_KINDS).notNull(),
    /** Both null: the part is known but not drawn into the network; it is then judged alone. */
    netA: ref().references(() => boardNets.id),
    netB: ref().references(() => boardNets.id),
    ohms: double(),
    tolerance: double(),
    /** For a contact: the positions in which it is closed. */
    closed: jsonText<string[]>(),
    /** As printed or as the trade says it: "1.1 kΩ PTC", "10D471K". */
    value: varchar({ length: 80 }).notNull().default(''),
    protection: boolean().notNull().default(false),
    note: varchar({ length: 300 }).notNull().default(''),
    place: int().notNull(),
  },
  (t) => [uniqueIndex('board_parts_ref').on(t.boardId, t.ref)],
);

/** The customer's own unit. */
export const instruments = mysqlTable(
  'instruments',
  {
    id: id(),
    modelId: ref()
      .notNull()
      .references(() => models.id),
    serial: varchar({ length: 60 }).notNull(),
    customerId: ref()
      .notNull()
      .references(() => customers.id),
    createdAt: moment().notNull(),
    version: int().notNull().default(1),
  },
  (t) => [
    uniqueIndex('instruments_serial').on(t.modelId, t.serial),
    index('instruments_customer').on(t.customerId),
  ],
);
