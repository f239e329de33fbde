import { sql } from 'kysely'
import { database } from '@/db'

export const dynamic = 'force-dynamic'

/** For whoever watches the server: 200 while the database answers, else 503. Says nothing about why. */
export async function GET() {
  const headers = { 'cache-control': 'no-store' }
  try {
    await sql`select 1`.execute(database())
    return Response.json({ status: 'ok' }, { headers })
  } catch (error) {
    console.error(error)
    return Response.json({ status: 'database-unreachable' }, { status: 503, headers })
  }
}
