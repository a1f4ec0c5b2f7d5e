import { customType, timestamp, uuid } from "drizzle-orm/pg-core";

/** Primary key made by the server, so that a row's id is known before it is stored. */
export const rowId = () =>
  uuid("id")
    .primaryKey()
    .$defaultFn(() => crypto.randomUUID());

export const moment = (name: string) => timestamp(name, { withTimezone: true, mode: "date" });

export const createdAt = () =>
  moment("created_at")
    .notNull()
    .$defaultFn(() => new Date());

/** JSON kept as text: unlike jsonb it comes back with its keys in the order in which they were written. */
export const jsonText = <Value>(name: string) =>
  customType<{ data: Value; driverData: string }>({
    dataType: () => "text",
    toDriver: (value) => JSON.stringify(value),
    fromDriver: (text) => JSON.parse(text),
  })(name);
