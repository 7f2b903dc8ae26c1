import { integer, timestamp, customType } from 'drizzle-orm/pg-core'

/** An instant, with its zone; what is compared, never shown raw. */
export const instant = () => timestamp({ withTimezone: true, mode: 'date' })

/** When the row was made and last changed. */
export const timestamps = {
  createdAt: instant().notNull().defaultNow(),
  updatedAt: instant().notNull().defaultNow().$onUpdate(() => new Date()),
}

/** Rows that two people may edit: a write names the version it saw and is refused if that is no longer the current one. */
export const version = () => integer().notNull().default(1)

/** Disjoint whole-hertz ranges, as PostgreSQL's text form `{[100000,320001),…}`. */
export const int8multirange = customType<{ data: string, driverData: string }>({
  dataType: () => 'int8multirange',
})
