import { writeFileSync } from 'node:fs'
import { env, stdout } from 'node:process'

/**
 * Counts what really happened, and prints one line for each file. A file that can't be loaded, a hook that fails and an
 * error that nobody caught count as failures of their own: each would otherwise hide tests that never ran.
 */
export default class Counter {
  #began = performance.now()

  /** @param {import('vitest/node').TestModule} module */
  onTestModuleEnd(module) {
    const { passed, failed, skipped } = count(module)
    const seconds = `${(module.diagnostic().duration / 1000).toFixed(1)} s`
    const words = [failed ? `${failed} FAILED` : '', passed ? `${passed} passed` : '', skipped ? `${skipped} skipped` : '']
    stdout.write(`    ${failed ? '✗' : '·'} ${module.relativeModuleId.padEnd(58)} ${seconds.padStart(7)}   ${words.filter(Boolean).join(', ')}\n`)
  }

  /**
   * @param {readonly import('vitest/node').TestModule[]} modules
   * @param {readonly unknown[]} unhandled
   * @param {string} reason
   */
  onTestRunEnd(modules, unhandled, reason) {
    const total = { passed: 0, failed: unhandled.length, skipped: 0, modules: modules.length }
    for (const module of modules) {
      const counts = count(module)
      total.passed += counts.passed
      total.failed += counts.failed
      total.skipped += counts.skipped
    }
    if (reason !== 'passed' && total.failed === 0) total.failed = 1
    if (env.KNURL_TEST_COUNTS) writeFileSync(env.KNURL_TEST_COUNTS, JSON.stringify({ ...total, ms: performance.now() - this.#began }))
  }
}

/** @param {import('vitest/node').TestModule} module */
function count(module) {
  const counts = { passed: 0, failed: module.errors().length, skipped: 0 }
  for (const suite of module.children.allSuites()) counts.failed += suite.errors().length
  for (const test of module.children.allTests()) {
    const { state } = test.result()
    if (state === 'passed') counts.passed++
    else if (state === 'failed') counts.failed++
    else counts.skipped++
  }
  if (counts.failed === 0 && module.state() === 'failed') counts.failed = 1
  return counts
}
