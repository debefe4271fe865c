// Tries mutants of the holding engine in one process: the tests are bundled once and loaded anew for each mutant.
// A test runner of vitest's own takes seconds a mutant to begin; this one takes as long as the tests.
import { fileURLToPath, pathToFileURL } from 'node:url'
import { join } from 'node:path'
import { INSTRUMENTER_CONSTANTS } from '@stryker-mutator/api/core'
import { declareClassPlugin, PluginKind } from '@stryker-mutator/api/plugin'
import { determineHitLimitReached, DryRunStatus, TestStatus, toMutantRunResult } from '@stryker-mutator/api/test-runner'
import { build } from 'vite'

/** A mutant met this often is taken to loop for ever. */
const MOST_HITS = 2_000_000

class PlainRunner {
  /** What the mutants look at to know which of them is on. */
  shared = globalThis[INSTRUMENTER_CONSTANTS.NAMESPACE] ??= {}
  loads = 0

  capabilities() {
    return { reloadEnvironment: true }
  }

  /** Stryker has made its copy of the sources the working directory. */
  async init() {
    const root = process.cwd()
    const outDir = join(root, 'reports/bundle')
    await build({
      configFile: false,
      root,
      logLevel: 'error',
      resolve: { alias: { '~~': root, 'vitest': fileURLToPath(new URL('./plain-vitest.mjs', import.meta.url)) } },
      build: { ssr: join(root, 'tests/unit/holding/every.ts'), outDir, rollupOptions: { output: { entryFileNames: 'every.mjs' } } },
    })
    this.bundle = pathToFileURL(join(outDir, 'every.mjs')).href
  }

  async dryRun() {
    return this.run(undefined, false)
  }

  async mutantRun({ activeMutant, disableBail }) {
    return toMutantRunResult(await this.run(activeMutant.id, !disableBail))
  }

  /** @returns what became of each test, up to the first that failed where `bail` says so */
  async run(mutant, bail) {
    Object.assign(this.shared, { activeMutant: mutant, hitCount: 0, hitLimit: MOST_HITS })
    this.loads += 1
    const results = []
    const attempt = async (name, work) => {
      const began = performance.now()
      const result = { id: name, name, status: TestStatus.Success }
      try {
        await work()
      } catch (error) {
        Object.assign(result, { status: TestStatus.Failed, failureMessage: String(error?.message ?? error) })
      }
      results.push({ ...result, timeSpentMs: performance.now() - began })
      return result.status === TestStatus.Success
    }
    if (await attempt('loading', () => import(`${this.bundle}?load=${this.loads}`))) {
      for (const { name, work } of globalThis.gatheredTests) if (!await attempt(name, work) && bail) break
    }
    return determineHitLimitReached(this.shared.hitCount, MOST_HITS) ?? { status: DryRunStatus.Complete, tests: results }
  }
}

export const strykerPlugins = [declareClassPlugin(PluginKind.TestRunner, 'plain', PlainRunner)]
