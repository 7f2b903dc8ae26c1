import { createServer } from 'node:net'
import { Trouble } from './steps.mjs'

/**
 * Tries to listen on a loopback port for a moment.
 *
 * @param {number} port 0 for any free one
 * @returns {Promise<{ port: number } | { refused: string }>} the port it got, or the system's code (`EADDRINUSE`, `EACCES`)
 */
function tryPort(port) {
  return new Promise((resolve) => {
    const server = createServer()
    server.once('error', (/** @type {NodeJS.ErrnoException} */ error) => resolve({ refused: error.code ?? 'UNKNOWN' }))
    server.listen({ port, host: '127.0.0.1', exclusive: true }, () => {
      const address = server.address()
      const got = typeof address === 'object' && address ? address.port : port
      server.close(() => resolve({ port: got }))
    })
  })
}

export async function freePort() {
  const result = await tryPort(0)
  if ('refused' in result) throw new Trouble(`No port is free on 127.0.0.1 (${result.refused}).`)
  return result.port
}

/** @param {number} port */
export async function isFree(port) {
  return 'port' in await tryPort(port)
}

/** @param {number} port @returns {Promise<string | undefined>} why the port can't be used, or undefined where it can */
export async function whyNot(port) {
  const result = await tryPort(port)
  if ('port' in result) return undefined
  if (result.refused === 'EADDRINUSE') return `Port ${port} is taken by another program.`
  if (result.refused === 'EACCES') return `Port ${port} is reserved for root.`
  return `Port ${port} can't be used (${result.refused}).`
}

/** @param {number} port @returns {Promise<number>} the next free port above it */
export async function nextFree(port) {
  for (let candidate = Math.max(port + 1, 1024); candidate < Math.min(port + 200, 65_536); candidate++) {
    if (await isFree(candidate)) return candidate
  }
  return freePort()
}

/** @param {string} text @param {string} where what the person typed it into */
export function readPort(text, where) {
  const port = Number(text)
  if (!/^\d+$/.test(text.trim()) || port < 1 || port > 65_535) {
    throw new Trouble(`${where} must be a number from 1 to 65535; "${text}" is not.`)
  }
  return port
}
