import { customType, uuid } from 'drizzle-orm/pg-core'

/** `timestamptz` in the database, ISO 8601 UTC text with milliseconds in the program: reads back byte for byte as a record has it. */
export const instant = customType<{ data: string, driverData: string | Date }>({
  dataType: () => 'timestamp with time zone',
  toDriver: value => value,
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
