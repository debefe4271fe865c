// `npm run rebuild`: folds every log anew and writes the projection beside it. The logs themselves are only read.
import { resolve } from 'node:path'
import { fileURLToPath } from 'node:url'
import { createJiti } from 'jiti'
import { startPostgres } from './lib/postgres.mjs'
import { closeAll } from './lib/processes.mjs'
import { say } from './lib/say.mjs'
import { loadSecrets } from './lib/secrets.mjs'

const root = fileURLToPath(new URL('..', import.meta.url)).replace(/\/$/, '')
const dataDirectory = resolve(root, process.env.HOLDOVER_DATA || '.data')
const jiti = createJiti(import.meta.url, { alias: { '~~': root, '@@': root } })

try {
  Object.assign(process.env, await loadSecrets(dataDirectory))
  const url = process.env.DATABASE_URL || (await startPostgres(dataDirectory)).urlOf('holdover')
  const { connect } = await jiti.import('../server/utils/database.ts')
  const { rebuildProjections } = await jiti.import('../server/utils/record/rebuild.ts')
  const { client, db } = connect(url, 1)
  const { count, differed } = await rebuildProjections(db)
  await client.end()
  say(`${count} outages folded anew; ${differed.length === 0 ? 'every projection was right' : `mended: ${differed.join(', ')}`}`)
  await closeAll()
} catch (error) {
  process.stderr.write(`${error.stack ?? error}\n`)
  await closeAll()
  process.exit(1)
}
