import { stdout } from 'node:process'

/**
 * Something that the person at the keyboard can mend: printed as plain words, without a stack.
 */
export class Trouble extends Error {
  /**
   * @param {string} message what is wrong, as a sentence
   * @param {{ advice?: string, output?: string }} [more] what mends it; what the failed program printed
   */
  constructor(message, more = {}) {
    super(message)
    this.name = 'Trouble'
    this.advice = more.advice ?? ''
    this.output = more.output ?? ''
  }
}

const width = 20

/** @param {number} ms */
export function formatDuration(ms) {
  if (ms < 60_000) return `${(ms / 1000).toFixed(1)} s`
  return `${Math.floor(ms / 60_000)} min ${Math.round((ms % 60_000) / 1000)} s`
}

/** @param {string} [line] */
export function say(line = '') {
  stdout.write(`${line}\n`)
}

/**
 * Runs one step and prints one line for it: `  Database … 1.2 s, already running`.
 *
 * @template T
 * @param {string} label
 * @param {(note: (words: string) => void) => T | Promise<T>} work `note` adds words after the time
 * @returns {Promise<T>} what the work returned
 */
export async function step(label, work) {
  const began = performance.now()
  let words = ''
  stdout.write(`  ${`${label} …`.padEnd(width)}`)
  try {
    const result = await work((text) => {
      words = text
    })
    const time = formatDuration(performance.now() - began)
    say(`${time.padStart(12)}${words ? `   ${words}` : ''}`)
    return result
  } catch (error) {
    say(`${formatDuration(performance.now() - began).padStart(12)}   failed`)
    throw error
  }
}

/** @param {string} text @param {string} margin */
function indent(text, margin) {
  return text.trimEnd().split('\n').map(line => line && `${margin}${line}`).join('\n')
}

/** Prints an error for a person and returns the exit code to leave with.
 * @param {unknown} error */
export function explain(error) {
  say()
  if (error instanceof Trouble) {
    if (error.output.trim()) say(`${indent(error.output, '  | ')}\n`)
    say(indent(error.message, '  '))
    if (error.advice) say(`\n${indent(error.advice, '  ')}`)
  } else {
    say(indent(error instanceof Error ? error.stack ?? error.message : String(error), '  '))
  }
  say()
  return 1
}
