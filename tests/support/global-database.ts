import { randomBytes } from 'node:crypto'
import { env } from 'node:process'
import pg from 'pg'
import type {} from 'vitest'
import type { TestProject } from 'vitest/node'
import { makeThrowawayCluster } from '../../scripts/lib/throwaway.mjs'
import { migrateDatabase } from '../../scripts/migrate'

declare module 'vitest' {
  interface ProvidedContext {
    /** A database on the test server from which others can be made. */
    maintenanceUrl: string
    /** A migrated, empty database that every test database is a copy of. */
    templateName: string
  }
}

/**
 * Migrates one template database, of which each test file gets its own copy. Uses the server of `TEST_DATABASE_URL`
 * (a role that may create databases), or starts a cluster that is removed at the end.
 */
export default async function setup(project: TestProject): Promise<() => Promise<void>> {
  const given = env.TEST_DATABASE_URL
  const cluster = given ? undefined : await makeThrowawayCluster()
  const maintenanceUrl = given ?? cluster?.url ?? ''
  const templateName = `knurl_template_${randomBytes(4).toString('hex')}`
  const removeTemplate = () => query(maintenanceUrl, `drop database if exists ${templateName} with (force)`)
  const teardown = () => cluster ? cluster.remove() : removeTemplate()
  try {
    await query(maintenanceUrl, `create database ${templateName}`)
    const url = new URL(maintenanceUrl)
    url.pathname = `/${templateName}`
    await migrateDatabase(url.href)
  } catch (error) {
    await teardown()
    throw error
  }
  project.provide('maintenanceUrl', maintenanceUrl)
  project.provide('templateName', templateName)
  return teardown
}

async function query(url: string, text: string): Promise<void> {
  const client = new pg.Client({ connectionString: url })
  await client.connect()
  try {
    await client.query(text)
  } finally {
    await client.end()
  }
}
