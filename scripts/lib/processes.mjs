import { readFileSync } from 'node:fs'
import { setTimeout as sleep } from 'node:timers/promises'

/**
 * When a process began, in the kernel's ticks since boot. Together with its number it names one process for good,
 * since numbers are given out again.
 *
 * @param {number} pid
 * @returns {string | undefined} undefined where no such process runs
 */
export function startedAt(pid) {
  try {
    const stat = readFileSync(`/proc/${pid}/stat`, 'utf8')
    const fields = stat.slice(stat.lastIndexOf(')') + 2).split(' ')
    return fields[0] === 'Z' ? undefined : fields[19]
  } catch {
    return undefined
  }
}

/** @param {number} pid @returns {{ pid: number, started: string }} */
export function identify(pid) {
  return { pid, started: startedAt(pid) ?? '' }
}

/** @param {{ pid: number, started: string } | undefined} identity */
export function isAlive(identity) {
  return identity !== undefined && identity.started !== '' && startedAt(identity.pid) === identity.started
}

/**
 * Ends exactly this process: asks, waits, then insists.
 *
 * @param {{ pid: number, started: string }} identity
 * @param {number} [patience] milliseconds before insisting
 */
export async function endProcess(identity, patience = 8000) {
  const signal = (/** @type {NodeJS.Signals} */ name) => {
    try {
      if (isAlive(identity)) process.kill(identity.pid, name)
    } catch { /* it ended in between */ }
  }
  signal('SIGTERM')
  for (let waited = 0; waited < patience && isAlive(identity); waited += 50) await sleep(50)
  signal('SIGKILL')
  for (let waited = 0; waited < 2000 && isAlive(identity); waited += 50) await sleep(50)
}
