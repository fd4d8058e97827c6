import pg from 'pg'

/** Looks behind the app, as the owner of the database under test: a row for each time that one of these operations is in the ledger. */
export async function serverOperations(ids: readonly string[]): Promise<string[]> {
  const connectionString = process.env.E2E_DATABASE_URL
  if (connectionString === undefined) throw new Error('This test looks into the database: run it by `npm test e2e`.')
  const client = new pg.Client({ connectionString })
  await client.connect()
  try {
    const { rows } = await client.query<{ id: string }>('select id from op where id = any($1)', [ids])
    return rows.map(row => row.id)
  }
  finally {
    await client.end()
  }
}
