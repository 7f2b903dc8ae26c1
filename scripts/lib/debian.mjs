import { existsSync, mkdirSync, rmSync, writeFileSync } from 'node:fs'
import { env } from 'node:process'
import { attempt, findProgram, isRoot, lastLines } from './run.mjs'
import { Trouble } from './steps.mjs'

/** While this file lies there, installing PostgreSQL makes the programs available and starts no server of Debian's own. */
const noMainCluster = '/etc/postgresql-common/createcluster.d/knurl.conf'

/**
 * Installs Debian packages, as root or through a sudo that asks nothing.
 *
 * @param {string[]} packages
 * @param {string} purpose what they are for, ending the sentence "Knurl needs …"
 */
export async function installPackages(packages, purpose) {
  const command = `apt-get install -y --no-install-recommends ${packages.join(' ')}`
  const byHand = `Run this once, then try again:\n\n    ${isRoot() ? '' : 'sudo '}apt-get update\n    ${isRoot() ? '' : 'sudo '}${command}`
  if (!findProgram('apt-get')) {
    throw new Trouble(`Knurl needs ${purpose}, and this system has no apt to install it with.`, {
      advice: `Install what corresponds to Debian's ${packages.join(', ')} and try again.`,
    })
  }
  const prefix = isRoot() ? [] : ['sudo', '-n', 'env', 'DEBIAN_FRONTEND=noninteractive']
  if (!isRoot()) {
    const may = findProgram('sudo') ? await attempt('sudo', ['-n', 'true']) : { code: 1 }
    if (may.code !== 0) throw new Trouble(`Knurl needs ${purpose}, and only an administrator may install it.`, { advice: byHand })
  }
  const apt = async (/** @type {string[]} */ args) => {
    const [program, ...rest] = [...prefix, 'apt-get', ...args]
    return attempt(program ?? 'apt-get', rest, { cwd: '/', toItsEnd: true, env: { ...env, DEBIAN_FRONTEND: 'noninteractive', LC_ALL: 'C.UTF-8' } })
  }
  // Another apt may be at work (a machine that updates itself): wait for its lock rather than fail.
  const install = ['-o', 'DPkg::Lock::Timeout=120', 'install', '-y', '--no-install-recommends', ...packages]
  const putBack = await withholdMainCluster(prefix)
  try {
    await apt(['-o', 'DPkg::Lock::Timeout=120', 'update'])
    const { code, output } = await apt(install)
    if (code !== 0) throw new Trouble(`Knurl needs ${purpose}, and apt could not install it.`, { output: lastLines(output, 20), advice: byHand })
  } finally {
    await putBack()
  }
}

/** @param {string[]} prefix @returns {Promise<() => Promise<void>>} puts things back as they were */
async function withholdMainCluster(prefix) {
  const folder = noMainCluster.slice(0, noMainCluster.lastIndexOf('/'))
  const line = 'create_main_cluster = off\n'
  if (prefix.length > 0) {
    const [program, ...rest] = prefix
    const shell = (/** @type {string} */ script) => attempt(program ?? 'sudo', [...rest, 'sh', '-c', script], { cwd: '/' })
    await shell(`mkdir -p ${folder} && echo '${line.trim()}' > ${noMainCluster}`)
    return async () => {
      await shell(`rm -f ${noMainCluster}; rmdir ${folder} 2>/dev/null || true`)
    }
  }
  const hadFolder = existsSync(folder)
  mkdirSync(folder, { recursive: true })
  writeFileSync(noMainCluster, line)
  return async () => {
    rmSync(noMainCluster, { force: true })
    if (!hadFolder) rmSync(folder, { recursive: true, force: true })
  }
}
