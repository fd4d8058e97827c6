import { sql } from 'drizzle-orm'
import pg from 'pg'
import { afterAll, beforeAll, describe, expect, inject, test } from 'vitest'
import { openDatabase, type Database } from '#server/database/client'
import { inOrganisation, outsideOrganisation } from '#server/database/with-organisation'
import { aSmallOrganisation, TestPhone, type SmallOrganisation } from './support/small-organisation'

let database: Database
let owner: pg.Client
let first: SmallOrganisation
let second: SmallOrganisation
let tables: string[]

beforeAll(async () => {
  database = openDatabase(inject('databaseUrl'))
  owner = new pg.Client({ connectionString: inject('ownerUrl') })
  await owner.connect()
  first = await aSmallOrganisation(database, 'First')
  second = await aSmallOrganisation(database, 'Second')
  for (const organisation of [first, second]) {
    const phone = new TestPhone(organisation, organisation.technician)
    await phone.push([phone.newSheet()])
  }
  tables = (await owner.query<{ name: string }>('select tablename as name from pg_tables where schemaname = \'public\' order by 1')).rows.map(row => row.name)
})
afterAll(async () => {
  await database.$client.end()
  await owner.end()
})

const countIn = async (name: string) => (await owner.query<{ count: string }>(`select count(*) from ${name}`)).rows[0]!.count

describe('row-level security', () => {
  test('stands on every table', async () => {
    const { rows } = await owner.query<{ name: string }>(`
      select relname as name from pg_class c join pg_namespace n on n.oid = c.relnamespace
      where n.nspname = 'public' and relkind = 'r' and (not relrowsecurity or not exists (select from pg_policy where polrelid = c.oid))`)
    expect(rows).toEqual([])
    expect(tables.length).toBeGreaterThan(8)
  })

  test('shows the app nothing at all without an organisation', async () => {
    for (const table of tables) {
      const { rows } = await database.$client.query(`select * from ${table} limit 1`)
      expect(rows, table).toEqual([])
    }
    expect(Number(await countIn('row_state'))).toBeGreaterThan(5)
  })

  test('shows one organisation nothing of another, also where the question names it', async () => {
    const withOrganisation = (await owner.query<{ name: string }>('select table_name as name from information_schema.columns where table_schema = \'public\' and column_name = \'organisation\'')).rows.map(row => row.name)
    expect(withOrganisation).toEqual(expect.arrayContaining(['op', 'row_state', 'device', 'sheets', 'surveys', 'users', 'sessions', 'org_clock', 'grant_scope']))
    for (const table of withOrganisation) {
      const found = await inOrganisation(database, first.id, tx => tx.execute(sql`select organisation from ${sql.identifier(table)} where organisation <> ${first.id}`))
      expect(found.rows, table).toEqual([])
    }
  })

  test('lets nobody write into another organisation', async () => {
    await expect(inOrganisation(database, first.id, tx => tx.execute(sql`insert into grant_scope (organisation, person, scope, ver) values (${second.id}, ${first.technician.id}, ${second.surveyId}, 1)`)))
      .rejects.toMatchObject({ cause: { message: expect.stringContaining('row-level security') } })
    const moved = await inOrganisation(database, first.id, tx => tx.execute(sql`update row_state set data = '{}' where organisation = ${second.id}`))
    expect(moved.rowCount).toBe(0)
  })

  test('opens only what signing in needs before an organisation is known', async () => {
    const open = ['organisations', 'users', 'sessions', 'sign_in_attempts']
    for (const table of tables.filter(name => !open.includes(name))) {
      const found = await outsideOrganisation(database, tx => tx.execute(sql`select 1 from ${sql.identifier(table)} limit 1`))
      expect(found.rows, table).toEqual([])
    }
  })

  test('does not nest, so that no transaction spans two organisations', async () => {
    await expect(inOrganisation(database, first.id, () => inOrganisation(database, second.id, async () => 1))).rejects.toThrow(/does not nest/)
    await expect(inOrganisation(database, first.id, () => outsideOrganisation(database, async () => 1))).rejects.toThrow(/does not nest/)
  })

  test('forgets the organisation with the transaction', async () => {
    await inOrganisation(database, first.id, tx => tx.execute(sql`select 1`))
    const clients = await Promise.all(Array.from({ length: 8 }, () => database.$client.connect()))
    try {
      for (const client of clients) expect((await client.query('select * from row_state limit 1')).rows).toEqual([])
    }
    finally {
      for (const client of clients) client.release()
    }
  })
})

describe('the ledger', () => {
  test('is only ever added to', async () => {
    for (const statement of [sql`update op set outcome = 'ok'`, sql`update op set body = '{}'`, sql`delete from op`, sql`truncate op`]) {
      await expect(inOrganisation(database, first.id, tx => tx.execute(statement))).rejects.toMatchObject({ cause: { message: expect.stringMatching(/permission denied/) } })
    }
    const blanked = await inOrganisation(database, first.id, tx => tx.execute(sql`update op set personal = null where kind = 'obj.new'`))
    expect(blanked.rowCount).toBeGreaterThan(0)
  })

  test('keeps a commit on the disk before it answers, whatever the server is set to', async () => {
    expect((await database.$client.query('show synchronous_commit')).rows).toEqual([{ synchronous_commit: 'on' }])
  })
})
