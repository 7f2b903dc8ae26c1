/**
 * Loads the demo shop through the same services as life does, so that every guard is honoured, then shifts what it
 * wrote to its day in the story.
 *
 *   tsx scripts/demo-shop.ts --if-empty     nothing happens where somebody is signed up already
 *   tsx scripts/demo-shop.ts --reload       throws the whole shop away first
 *   … --without-photos                      quicker, for tests
 */
import { randomInt } from 'node:crypto'
import { chmodSync, existsSync, mkdirSync, readFileSync, rmSync, writeFileSync } from 'node:fs'
import { dirname, join } from 'node:path'
import { argv, env, exit } from 'node:process'
import { sql } from 'drizzle-orm'
import { migrate } from 'drizzle-orm/node-postgres/migrator'
import { createStorage } from 'unstorage'
import { isFirstRun } from '../server/services/people'
import { openDatabase } from '../server/utils/db'
import { fileDriver, fileStoreOn } from '../server/utils/file-store'
import { loadDemoShop } from './demo/load'

const root = join(import.meta.dirname, '..')
const passwordFile = join(env.NUXT_FILES_DIR ? dirname(env.NUXT_FILES_DIR) : join(root, '.data'), 'demo-password')

/** Made at the first load and kept: four short words are easy to type on a phone and far from any list. */
function demoPassword(): string {
  if (existsSync(passwordFile)) return readFileSync(passwordFile, 'utf8').trim()
  const words = ['amber', 'anode', 'bakelite', 'brass', 'cursor', 'detent', 'enamel', 'ferrite', 'grommet', 'knurl', 'lacquer', 'mica', 'octal', 'pilot', 'rivet', 'solder', 'spindle', 'tinned', 'trimmer', 'vernier']
  const password = [...Array.from({ length: 4 }, () => words[randomInt(words.length)]), randomInt(1000, 9999)].join('-')
  mkdirSync(dirname(passwordFile), { recursive: true })
  writeFileSync(passwordFile, `${password}\n`, { mode: 0o600 })
  chmodSync(passwordFile, 0o600)
  return password
}

const url = env.NUXT_DATABASE_URL
if (!url) {
  console.error('NUXT_DATABASE_URL is not set: say which database the demo shop goes into.')
  exit(1)
}
const { db, pool } = openDatabase(url)
const filesDir = env.NUXT_FILES_DIR ?? join(root, '.data/files')
if (argv.includes('--reload')) {
  // The ledger can't be emptied, by design: the shop goes as a whole, and is built again by its own migrations.
  await db.execute(sql`drop schema public cascade`)
  await db.execute(sql`drop schema if exists drizzle cascade`)
  await db.execute(sql`drop schema if exists graphile_worker cascade`)
  await db.execute(sql`create schema public`)
  await migrate(db, { migrationsFolder: join(root, 'drizzle/migrations') })
  rmSync(filesDir, { recursive: true, force: true })
}
if (await isFirstRun(db)) {
  const began = performance.now()
  const store = argv.includes('--without-photos')
    ? null
    : fileStoreOn(createStorage({ driver: fileDriver({ filesDir, s3: { bucket: env.NUXT_S3_BUCKET ?? '', endpoint: env.NUXT_S3_ENDPOINT ?? '', region: env.NUXT_S3_REGION ?? '', accessKeyId: env.NUXT_S3_ACCESS_KEY_ID ?? '', secretAccessKey: env.NUXT_S3_SECRET_ACCESS_KEY ?? '' } }) }))
  const { unitCount, photoCount } = await loadDemoShop(db, store, demoPassword())
  console.log(`${unitCount} units, ${photoCount} photos, ${((performance.now() - began) / 1000).toFixed(0)} s`)
} else {
  console.log('already open')
}
await pool.end()
