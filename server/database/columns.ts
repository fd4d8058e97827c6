import { customType, uuid } from 'drizzle-orm/pg-core'

/** PostgreSQL has no year 0, which ISO 8601 has: a phone whose clock is that far off gets the first instant there is. */
const FIRST_INSTANT = Date.parse('0001-01-01T00:00:00.000Z')

/** `timestamptz` in the database, ISO 8601 UTC text with milliseconds in the program: reads back byte for byte as a record has it. */
export const instant = customType<{ data: string, driverData: string | Date }>({
  dataType: () => 'timestamp with time zone',
  toDriver: value => new Date(Math.max(Date.parse(value), FIRST_INSTANT)).toISOString(),
  fromDriver: value => (value instanceof Date ? value : new Date(value)).toISOString(),
})

/** `bigint` as a number: versions and counters stay far below 2^53. */
export const count = customType<{ data: number, driverData: string | number }>({
  dataType: () => 'bigint',
  toDriver: value => value,
  fromDriver: value => Number(value),
})

export const bytes = customType<{ data: Buffer }>({ dataType: () => 'bytea' })

/** The organisation leads every key; row-level security compares it with the one of the session. */
export const organisationColumn = () => uuid().notNull()

/** Text in byte order, whatever the database's language: the feed's order must be the program's. */
export const byteText = customType<{ data: string }>({ dataType: () => 'text collate "C"' })
