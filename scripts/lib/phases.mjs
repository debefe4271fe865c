import { readJson } from './files.mjs'
import { run } from './processes.mjs'
import { Refusal, spell } from './say.mjs'

/** No single phase takes this long unless it hangs: milliseconds. */
const PATIENCE = 20 * 60_000

/** @typedef {{ passed: number, failed: number, skipped: number }} Count tests */

/**
 * Does one part of the tests under a heading, and says how long it took.
 * @template T
 * @param {string} name
 * @param {() => Promise<T>} work
 * @returns {Promise<T>}
 */
export async function phase(name, work) {
  process.stdout.write(`\n== ${name}\n`)
  const began = Date.now()
  const result = await work()
  process.stdout.write(`== ${name}: ${spell(Date.now() - began)}\n`)
  return result
}

/**
 * Runs a program that must succeed.
 * @param {string} command
 * @param {string[]} args
 * @param {{ cwd: string, env?: NodeJS.ProcessEnv, quiet?: boolean, sentence: string }} options
 *   sentence: says what is wrong when it fails; quiet: the output is shown only then
 * @throws {Refusal} with the sentence
 */
export async function mustRun(command, args, { sentence, ...options }) {
  const { code, output, timedOut } = await run(command, args, { ...options, timeout: PATIENCE })
  if (timedOut) throw new Refusal(`${sentence} (It was stopped after ${spell(PATIENCE)}.)`)
  if (code !== 0) throw new Refusal(`${sentence}\n${output.trim()}`.trim())
}

/** What Vitest's JSON report counts. @returns {Promise<Count | null>} null when there is no report */
export async function countVitest(path) {
  const report = await readJson(path)
  return report && { passed: report.numPassedTests, failed: report.numFailedTests, skipped: report.numPendingTests + report.numTodoTests }
}

/** What Playwright's JSON report counts; a test that passes only when repeated has failed. */
export async function countPlaywright(path) {
  const report = await readJson(path)
  return report && { passed: report.stats.expected, failed: report.stats.unexpected + report.stats.flaky, skipped: report.stats.skipped }
}
