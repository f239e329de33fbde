/** Makes a database of this name in the cluster unless it is there. The names are our own, so they need no quoting. */
export async function createDatabaseIfMissing(clusterUrl, name) {
  // Loaded late: this module is read before the dependencies are installed.
  const { default: pg } = await import('pg')
  const client = new pg.Client({ connectionString: clusterUrl })
  await client.connect()
  try {
    const { rowCount } = await client.query('select 1 from pg_database where datname = $1', [name])
    if (rowCount === 0) await client.query(`create database ${name}`)
  } finally {
    await client.end()
  }
}
