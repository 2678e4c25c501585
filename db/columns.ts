import { bigint, customType, integer, jsonb, text, timestamp, uuid } from 'drizzle-orm/pg-core';

/** The shop a row belongs to: leads every key (P5). */
export const shopId = () => uuid('shop_id').notNull();
/** The identifier of a row; the writer makes it, so that a repeated request makes no second row. */
export const rowId = () => uuid('id').notNull();
/** A reference to another row of the same shop. */
export const ref = (name: string) => uuid(name);
/** A moment with time zone. */
export const moment = (name: string) => timestamp(name, { withTimezone: true, precision: 3 });
/** Catalogue cursor at the row's last change; a trigger fills it, whoever writes (decision 9). */
export const changed = () => bigint('changed', { mode: 'number' }).notNull().default(0);
/** A whole number beyond 32 bits. */
export const big = (name: string) => bigint(name, { mode: 'number' });
/** A whole number. */
export const whole = (name: string) => integer(name);
/** Text that may be empty but is never null. */
export const words = (name: string) => text(name).notNull().default('');
/** A JSON document of a known shape. */
export const json = <T>(name: string) => jsonb(name).$type<T>();

/** Raw bytes: of an event they are the truth, everything beside them a projection (decision 2). */
export const bytes = customType<{ data: Buffer; driverData: Buffer }>({ dataType: () => 'bytea' });
