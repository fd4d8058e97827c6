import pg from 'pg'
import { describe, expect, inject, test } from 'vitest'

async function ask<Row extends pg.QueryResultRow>(url: string, statement: string): Promise<Row[]> {
  const client = new pg.Client({ connectionString: url })
  await client.connect()
  try {
    return (await client.query<Row>(statement)).rows
  }
  finally {
    await client.end()
  }
}

describe('the private database', () => {
  test('gives the running app a role without any power over the server', async () => {
    const rows = await ask(inject('databaseUrl'), 'select rolname, rolsuper, rolcreaterole, rolcreatedb, rolreplication, rolbypassrls from pg_roles where rolname = current_user')
    expect(rows).toEqual([{ rolname: 'lapel_app', rolsuper: false, rolcreaterole: false, rolcreatedb: false, rolreplication: false, rolbypassrls: false }])
  })

  test('gives migrations a role that owns the database and still cannot pass row-level security', async () => {
    const rows = await ask(inject('ownerUrl'), 'select current_user as me, pg_get_userbyid(datdba) as owner, (select rolsuper or rolbypassrls from pg_roles where rolname = current_user) as powerful from pg_database where datname = current_database()')
    expect(rows).toEqual([{ me: 'lapel_owner', owner: 'lapel_owner', powerful: false }])
  })

  test('lets the app own nothing and make nothing', async () => {
    expect(await ask(inject('ownerUrl'), 'select relname from pg_class where pg_get_userbyid(relowner) = \'lapel_app\'')).toEqual([])
    await expect(ask(inject('databaseUrl'), 'create table planted (id int)')).rejects.toThrow(/permission denied for schema public/)
    await expect(ask(inject('databaseUrl'), 'create schema planted')).rejects.toThrow(/permission denied for database/)
  })

  test('refuses a wrong password and a role without one', async () => {
    const wrong = new URL(inject('databaseUrl'))
    wrong.password = 'wrong'
    await expect(ask(wrong.href, 'select 1')).rejects.toThrow(/password authentication failed/)
  })

  test('keeps a commit on the disk before it answers', async () => {
    expect(await ask(inject('databaseUrl'), 'select current_setting(\'fsync\') as fsync, current_setting(\'synchronous_commit\') as commit')).toEqual([{ fsync: 'on', commit: 'on' }])
  })

  test('listens on the loopback address alone', async () => {
    expect(await ask(inject('databaseUrl'), 'select current_setting(\'listen_addresses\') as addresses, inet_server_addr()::text as mine')).toEqual([{ addresses: '127.0.0.1', mine: '127.0.0.1/32' }])
  })
})
