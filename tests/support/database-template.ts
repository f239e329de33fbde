import pg from 'pg'
import type { TestProject } from 'vitest/node'
import { createDatabase } from '@/db/create-db'
import { startThrowawayCluster } from '@/db/local/throwaway-cluster.mjs'
import { migrateToLatest, prepareQueue } from '@/db/migrate'

declare module 'vitest' {
  export interface ProvidedContext {
    /** Address of the cluster, and the name of the migrated database to clone. */
    testCluster: { url: string; template: string }
  }
}

export function urlOfDatabase(clusterUrl: string, name: string): string {
  const url = new URL(clusterUrl)
  url.pathname = `/${name}`
  return url.href
}

export async function onCluster(clusterUrl: string, statement: string): Promise<void> {
  const client = new pg.Client({ connectionString: clusterUrl })
  await client.connect()
  try {
    await client.query(statement)
  } finally {
    await client.end()
  }
}

/** Migrates one database that every test file clones; the cluster is TEST_DATABASE_URL's, else one of our own. */
export default async function setup(project: TestProject) {
  const given = process.env.TEST_DATABASE_URL
  const cluster = given ? { url: given, remove: async () => {} } : await startThrowawayCluster()
  const template = `turnwright_template_${process.pid}`
  try {
    await onCluster(cluster.url, `create database ${template}`)
    const { db } = createDatabase({ connectionString: urlOfDatabase(cluster.url, template), poolSize: 1 })
    try {
      await migrateToLatest(db)
      await prepareQueue(urlOfDatabase(cluster.url, template))
    } finally {
      await db.destroy()
    }
    project.provide('testCluster', { url: cluster.url, template })
  } catch (error) {
    await cluster.remove()
    throw error
  }
  return async () => {
    await onCluster(cluster.url, `drop database if exists ${template} with (force)`)
    await cluster.remove()
  }
}
