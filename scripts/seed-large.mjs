// `npm run seed:large [-- outages]`: grows the demo's database to so many outages (20,000, with 1,000,000 entries), for
// measurements. They are copies of two signed records with ids of their own: the copies' signatures are not valid.
import { resolve } from 'node:path'
import { fileURLToPath } from 'node:url'
import { migrate } from 'drizzle-orm/postgres-js/migrator'
import { createJiti } from 'jiti'
import { makeDatabase, startPostgres } from './lib/postgres.mjs'
import { closeAll } from './lib/processes.mjs'
import { Refusal, say } from './lib/say.mjs'
import { loadSecrets } from './lib/secrets.mjs'

const root = fileURLToPath(new URL('..', import.meta.url)).replace(/\/$/, '')
const dataDirectory = resolve(root, process.env.HOLDOVER_DATA || '.data')
const jiti = createJiti(import.meta.url, { alias: { '~~': root, '@@': root } })

/** The one that `npm start` uses, which must not be running. */
async function ownDatabase() {
  const { urlOf } = await startPostgres(dataDirectory)
  await makeDatabase(urlOf('postgres'), 'holdover')
  return urlOf('holdover')
}

try {
  const { LARGEST, seedLarge } = await jiti.import('../server/database/seed/large.ts')
  const count = Number(process.argv[2] ?? LARGEST)
  if (!Number.isInteger(count) || count < 1 || count > LARGEST) throw new Refusal(`Give a number of outages from 1 to ${LARGEST}.`)
  Object.assign(process.env, await loadSecrets(dataDirectory))
  const url = process.env.DATABASE_URL || await ownDatabase()
  const { connect } = await jiti.import('../server/utils/database.ts')
  const { openStorage } = await jiti.import('../server/utils/files/storage.ts')
  const { seedDemo } = await jiti.import('../server/database/seed/index.ts')
  const { client, db } = connect(url, 2)
  await migrate(db, { migrationsFolder: resolve(root, 'server/database/migrations') })
  const began = performance.now()
  await seedDemo(db, Date.now(), openStorage({ dataDir: dataDirectory, ...process.env }))
  await seedLarge(db, count, Date.now())
  const [{ entries }] = await client`select count(*)::int as entries from entries`
  await client.end()
  say(`${count} copied outages, ${entries} entries in all, ${Math.round((performance.now() - began) / 1000)} s`)
  await closeAll()
} catch (error) {
  process.stderr.write(`${error instanceof Refusal ? error.message : error.stack ?? error}\n`)
  await closeAll()
  process.exit(1)
}
