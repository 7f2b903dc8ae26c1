import process, { exit } from 'node:process'
import { setTimeout as sleep } from 'node:timers/promises'
import { halt, resume } from './run.mjs'
import { explain, step } from './steps.mjs'

/**
 * What every command does around its work: whatever was opened is closed again in the opposite order, whether the work
 * ends by itself, fails, or is interrupted; and trouble is told in words.
 */
export class Command {
  /** @type {(() => Promise<void>)[]} */
  #open = []
  /** @type {Promise<number | void>} */
  #work = Promise.resolve()
  #lastWords = () => {}
  isStopping = false
  /** Announces the closing with a line of its own: for commands that stay. */
  isServing = false

  /** @param {() => Promise<void>} close */
  onStop(close) {
    this.#open.push(close)
  }

  /** What is printed after everything has been closed.
   * @param {() => void} print */
  onEnd(print) {
    this.#lastWords = print
  }

  /** Closes everything and leaves.
   * @param {number} code @param {boolean} [isInterrupted] while the work was still under way */
  async stop(code, isInterrupted = false) {
    if (this.isStopping) return
    this.isStopping = true
    // What was under way when Ctrl-C came must have ended before things are closed behind it.
    halt()
    if (isInterrupted) await Promise.race([this.#work, sleep(40_000, undefined, { ref: false })])
    resume()
    if (this.isServing) await step('\n  Stopping', () => this.#close())
    else await this.#close()
    this.#lastWords()
    exit(code)
  }

  async #close() {
    for (const close of this.#open.splice(0).reverse()) {
      await close().catch(explain)
    }
  }

  /** @param {() => Promise<number | void>} work its exit code, or nothing for a command that stays until it is stopped */
  async run(work) {
    for (const signal of ['SIGINT', 'SIGTERM', 'SIGHUP']) {
      process.on(signal, () => void this.stop(this.isServing ? 0 : 130, true))
    }
    this.#work = work().then(
      code => code,
      error => this.isStopping ? 130 : explain(error),
    )
    const code = await this.#work
    if (code !== undefined) await this.stop(code)
  }
}
