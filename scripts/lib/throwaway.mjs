import { randomBytes } from 'node:crypto'
import { existsSync, mkdirSync, readFileSync, readdirSync, rmSync, writeFileSync } from 'node:fs'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { pid } from 'node:process'
import { admin, databaseUrl, makeCluster, makePassword, startCluster, stopCluster } from './cluster.mjs'
import { ensureRole, urlOf } from './database.mjs'
import { identify, isAlive } from './processes.mjs'
import { isRoot } from './run.mjs'

const prefix = 'knurl-throwaway-'
/** Root's temporary folder may be closed to the user that runs PostgreSQL. */
const parent = () => isRoot() ? '/var/lib/knurl' : tmpdir()

/** Removes what killed test runs have left behind; those of living ones stay. */
async function sweep() {
  if (!existsSync(parent())) return
  for (const name of readdirSync(parent()).filter(entry => entry.startsWith(prefix))) {
    const folder = join(parent(), name)
    try {
      const holder = JSON.parse(readFileSync(join(folder, 'holder.json'), 'utf8'))
      if (isAlive(holder)) continue
      await stopCluster(join(folder, 'pg'))
      rmSync(folder, { recursive: true, force: true })
    } catch { /* another user's, or one that is being made at this moment */ }
  }
}

/**
 * Makes and starts a PostgreSQL cluster on a free port that holds nothing and is removed by `remove`.
 *
 * @returns {Promise<{ url: string, adminUrl: string, log: string, port: number, remove: () => Promise<void> }>} `url`
 * leads to its maintenance database, as a role that may create databases; `adminUrl` as its administrator
 */
export async function makeThrowawayCluster() {
  await sweep()
  const folder = join(parent(), `${prefix}${randomBytes(4).toString('hex')}`)
  mkdirSync(folder, { recursive: true, mode: 0o755 })
  writeFileSync(join(folder, 'holder.json'), JSON.stringify(identify(pid)))
  const directory = join(folder, 'pg')
  const remove = async () => {
    await stopCluster(directory)
    rmSync(folder, { recursive: true, force: true })
  }
  try {
    const adminPassword = makePassword()
    const password = makePassword()
    await makeCluster(directory, { password: adminPassword, throwAway: true })
    const { port } = await startCluster(directory)
    await ensureRole({ port, adminPassword, password })
    return {
      url: urlOf({ port, password }, 'postgres'),
      adminUrl: databaseUrl({ user: admin, password: adminPassword, port, database: 'postgres' }),
      log: join(directory, 'server.log'),
      port,
      remove,
    }
  } catch (error) {
    await remove()
    throw error
  }
}
