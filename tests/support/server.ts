import { randomBytes } from 'node:crypto'
import { mkdtemp, rename, rm, writeFile } from 'node:fs/promises'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { fileURLToPath } from 'node:url'
import { anyFreePort } from '../../scripts/lib/ports.mjs'
import { dropDatabase, makeDatabase } from '../../scripts/lib/postgres.mjs'
import { startServer, waitForHealth } from '../../scripts/lib/server.mjs'

const root = fileURLToPath(new URL('../..', import.meta.url))

export interface TestServerOptions {
  /** With the demo's people, sites and outages; else empty, as a first visit finds it. */
  demo?: boolean
  /** With the jobs that run by the clock; else nothing happens that nobody asked for. */
  jobs?: boolean
  /** A free one by default. */
  port?: number
  /** Added to the server's environment. */
  env?: Record<string, string>
}

export interface TestServer {
  url: string
  databaseUrl: string
  /** Where the server keeps its files. */
  dataDirectory: string
  /** The server's time, in milliseconds since 1970. */
  now: () => number
  /** Moves the server's clock on. */
  advance: (minutes: number) => Promise<void>
  /** Ends the server and leaves its database and files, as a failure does. */
  down: () => Promise<void>
  /** The same without letting it finish anything. */
  kill: () => Promise<void>
  /** Starts it again at the same address. */
  up: () => Promise<void>
  /** Ends the server and takes its database and files away. */
  stop: () => Promise<void>
}

/**
 * Starts the built server on a free port of 127.0.0.1, with a fresh database in the cluster that
 * TEST_DATABASE_ADMIN_URL names and with a clock that the test can move.
 */
export async function startTestServer({ demo = false, jobs = false, port, env = {} }: TestServerOptions = {}): Promise<TestServer> {
  const adminUrl = process.env.TEST_DATABASE_ADMIN_URL
  if (!adminUrl) throw new Error('TEST_DATABASE_ADMIN_URL is not set; run these tests by npm run test:api or npm run test:e2e.')
  const database = `holdover_test_${randomBytes(6).toString('hex')}`
  await makeDatabase(adminUrl, database)
  const databaseUrl = Object.assign(new URL(adminUrl), { pathname: `/${database}` }).href
  const dataDirectory = await mkdtemp(join(tmpdir(), 'holdover-server-'))
  const clock = join(dataDirectory, 'clock')
  const listenPort = port ?? await anyFreePort()
  const url = `http://127.0.0.1:${listenPort}`

  const [authSecret, serverKey] = [randomBytes(32).toString('base64url'), randomBytes(32).toString('base64url')]
  const start = () => startServer(['-r', join(root, 'tests/support/clock.cjs'), join(root, '.output/server/index.mjs')], {
    cwd: root,
    quiet: !process.env.HOLDOVER_TEST_TALK,
    env: {
      PATH: process.env.PATH,
      NODE_ENV: 'production',
      HOST: '127.0.0.1', PORT: String(listenPort), NITRO_HOST: '127.0.0.1', NITRO_PORT: String(listenPort),
      AUTH_ORIGIN: `${url}/api/auth`,
      NUXT_AUTH_SECRET: authSecret,
      HOLDOVER_SERVER_KEY: serverKey,
      NUXT_DATABASE_URL: databaseUrl,
      NUXT_DATA_DIR: dataDirectory,
      HOLDOVER_DEMO: demo ? '1' : '0',
      HOLDOVER_JOBS: jobs ? '1' : '0',
      HOLDOVER_TEST_CLOCK: clock,
      NITRO_SHUTDOWN_TIMEOUT: '1000',
      ...env,
    },
  })
  let server = start()
  async function up() {
    server = start()
    const health = await waitForHealth(`${url}/api/health`, server)
    if (!health.ready) throw new Error(`The server under test did not come up:\n${health.words}`)
  }
  async function stop() {
    await server.stop()
    await dropDatabase(adminUrl!, database)
    await rm(dataDirectory, { recursive: true, force: true })
  }
  const health = await waitForHealth(`${url}/api/health`, server)
  if (!health.ready) {
    await stop()
    throw new Error(`The server under test did not come up:\n${health.words}`)
  }

  let offset = 0
  return {
    url,
    databaseUrl,
    dataDirectory,
    now: () => Date.now() + offset,
    async advance(minutes) {
      offset += minutes * 60_000
      await writeFile(`${clock}.new`, String(offset))
      await rename(`${clock}.new`, clock)
    },
    down: async () => { await server.stop() },
    kill: async () => { await server.kill() },
    up,
    stop,
  }
}
