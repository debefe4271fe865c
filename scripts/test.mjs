// `npm test`: all set-up, then every check there is. `--only lint|types|migrations|unit|api|e2e` for some of them;
// what follows `--` goes to the test runner of the one part that is chosen.
import { existsSync } from 'node:fs'
import { chmod, mkdtemp, rm } from 'node:fs/promises'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { fileURLToPath } from 'node:url'
import { buildServer } from './lib/build.mjs'
import { checkNode, installPackages } from './lib/install.mjs'
import { checkMigrations } from './lib/migrations.mjs'
import { countPlaywright, countVitest, mustRun, phase } from './lib/phases.mjs'
import { startPostgres } from './lib/postgres.mjs'
import { closeAll, closeOnSignals, isClosing, onClose } from './lib/processes.mjs'
import { Refusal, say } from './lib/say.mjs'
import { findProgram, installSystemPackages, PREFLIGHT_JARS } from './lib/system.mjs'

const root = fileURLToPath(new URL('..', import.meta.url)).replace(/\/$/, '')
const bin = name => join(root, 'node_modules/.bin', name)
const total = { passed: 0, failed: 0, skipped: 0 }
const env = { ...process.env, NUXT_TELEMETRY_DISABLED: '1' }

/** The parts in their order: cheap ones first. */
const PARTS = {
  async lint() {
    await phase('Lint', () => mustRun(bin('eslint'), ['.'], { cwd: root, env, sentence: 'ESLint found faults.' }))
  },
  async types() {
    await phase('Types', async () => {
      await mustRun(bin('nuxt'), ['typecheck'], { cwd: root, env, sentence: 'The types of the program do not hold.' })
      await mustRun(bin('vue-tsc'), ['--noEmit', '-p', 'tests/tsconfig.json'], { cwd: root, env, sentence: 'The types of the tests do not hold.' })
    })
  },
  async migrations() {
    await phase('Migrations', () => checkMigrations(root))
  },
  async unit(extra) {
    await phase('Unit', () => vitest('unit', extra))
  },
  async api(extra) {
    const serving = await phase('Set-up of API tests', setUpServing)
    await phase('API', () => vitest('api', extra, serving))
  },
  async e2e(extra) {
    const serving = await phase('Set-up of end-to-end tests', setUpServing)
    await phase('End to end', async () => {
      await counted('reports/e2e.json', countPlaywright, () => mustRun(bin('playwright'), ['test', ...extra], {
        cwd: root, env: { ...env, ...serving }, sentence: 'End-to-end tests failed.',
      }))
    })
  },
}

async function main() {
  const { parts, extra } = readArguments(process.argv.slice(2))
  await phase('Set-up', async () => {
    checkNode()
    await installPackages(root)
    if (parts.some(part => part === 'unit' || part === 'api' || part === 'e2e')) await installTools()
    if (parts.some(part => part !== 'migrations')) {
      await mustRun(bin('nuxt'), ['prepare'], { cwd: root, env, quiet: true, sentence: 'Nuxt could not prepare its types.' })
    }
  })
  for (const part of parts) await PARTS[part](extra)
  if (isClosing()) return
  await closeAll()
  close(0)
}

/** @returns {{ parts: string[], extra: string[] }} */
function readArguments(args) {
  const end = args.includes('--') ? args.indexOf('--') : args.length
  const parts = []
  for (let place = 0; place < end; place += 2) {
    if (args[place] !== '--only' || !Object.hasOwn(PARTS, args[place + 1] ?? '')) {
      throw new Refusal(`Known: --only ${Object.keys(PARTS).join('|')}; not ${args.slice(place, end).join(' ')}.`)
    }
    parts.push(args[place + 1])
  }
  const extra = args.slice(end + 1)
  if (extra.length > 0 && parts.length !== 1) throw new Refusal('Words after -- go to one part: choose it by --only.')
  return { parts: parts.length > 0 ? parts : Object.keys(PARTS), extra }
}

/** Programs of the system that tests use: a browser, readers of PDF, and a validator of PDF/A. */
async function installTools() {
  const wanted = { chromium: 'chromium', pdftotext: 'poppler-utils', qpdf: 'qpdf' }
  const missing = Object.entries(wanted).filter(([program]) => !findProgram(program)).map(([, name]) => name)
  if (missing.length > 0) await installSystemPackages(missing, `The tests need ${missing.join(', ')}`)
  const jars = Object.entries(PREFLIGHT_JARS).filter(([jar]) => !existsSync(jar)).map(([, name]) => name)
  const validator = [...new Set([...(findProgram('java') ? [] : ['default-jre-headless']), ...jars])]
  if (validator.length === 0) return
  try {
    await installSystemPackages(validator, 'One test validates PDF/A by PDFBox Preflight')
  } catch (error) {
    // Only that test needs it: it fails and says so, and all others still run.
    say(error.message)
  }
}

let serving = null

/**
 * The built server and a PostgreSQL of the tests' own. What the tests write goes into the same room: nothing is left behind,
 * even of a test that was interrupted.
 * @returns {Promise<{ TEST_DATABASE_ADMIN_URL: string, TMPDIR: string }>} for their environment
 */
async function setUpServing() {
  await buildServer(root)
  if (serving) return serving
  const room = await mkdtemp(join(tmpdir(), 'holdover-test-'))
  onClose(() => rm(room, { recursive: true, force: true }))
  await chmod(room, 0o711)
  const { urlOf } = await startPostgres(room, {
    // Nothing of this is kept, so nothing waits for the disk.
    settings: { fsync: 'off', synchronous_commit: 'off', full_page_writes: 'off', max_connections: '300' },
    beforeStart: place => onClose(() => rm(place, { recursive: true, force: true })),
  })
  serving = { TEST_DATABASE_ADMIN_URL: urlOf('postgres'), TMPDIR: room }
  return serving
}

async function vitest(project, extra, more = {}) {
  const report = `reports/${project}.json`
  await counted(report, countVitest, () => mustRun(bin('vitest'), [
    'run', '--project', project, '--reporter=default', '--reporter=json', `--outputFile.json=${report}`, ...extra,
  ], { cwd: root, env: { ...env, ...more }, sentence: `Tests of the project ${project} failed.` }))
}

/** Runs tests and adds what their report counts to the total, whether they pass or not. */
async function counted(report, count, work) {
  const path = join(root, report)
  await rm(path, { force: true })
  let found = null
  try {
    await work()
  } finally {
    found = await count(path)
    for (const key of Object.keys(total)) total[key] += found?.[key] ?? 0
  }
  if (!found?.passed) throw new Refusal(`No test ran: ${report} counts none.`)
}

/** The closing line, alone on its own. */
function close(code) {
  if (total.skipped > 0) process.stdout.write(`\n${total.skipped} skipped`)
  process.stdout.write(`\n${total.passed} passed, ${total.failed} failed\n`)
  process.exitCode = code
  process.exit()
}

async function fail(error) {
  if (isClosing()) return
  process.stderr.write(`\n${error instanceof Refusal ? error.message : error.stack}\n`)
  // A part without tests of its own, such as lint, fails as one.
  if (total.failed === 0) total.failed = 1
  await closeAll()
  close(1)
}

closeOnSignals(130, () => process.stdout.write('\nStopping\n'))
main().catch(fail)
