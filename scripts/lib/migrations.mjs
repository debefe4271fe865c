import { cp, mkdir, readdir, rm, writeFile } from 'node:fs/promises'
import { join } from 'node:path'
import { run } from './processes.mjs'
import { Refusal } from './say.mjs'

/**
 * Refuses a schema whose migrations are not all made: generates on a copy, and looks whether anything came of it.
 * @param {string} root the project's directory, absolute
 */
export async function checkMigrations(root) {
  const room = join(root, 'reports/migrations-check')
  await rm(room, { recursive: true, force: true })
  await mkdir(room, { recursive: true })
  try {
    await cp(join(root, 'server/database/migrations'), join(room, 'migrations'), { recursive: true })
    await writeFile(join(room, 'drizzle.config.ts'), [
      'import config from \'../../drizzle.config\'',
      'export default { ...config, out: \'./reports/migrations-check/migrations\' }',
      '',
    ].join('\n'))
    const before = await namesBelow(join(room, 'migrations'))
    const { code, output } = await run(join(root, 'node_modules/.bin/drizzle-kit'), ['generate', '--config=reports/migrations-check/drizzle.config.ts'], { cwd: root, quiet: true })
    const made = (await namesBelow(join(room, 'migrations'))).filter(name => !before.includes(name))
    if (code !== 0 || made.length > 0) {
      throw new Refusal(`The tables in server/database/schema and the migrations differ; run npm run db:generate and commit what it makes.\n${made.join('\n')}\n${code === 0 ? '' : output.trim()}`.trim())
    }
    if (!/nothing to migrate/i.test(output)) throw new Refusal(`drizzle-kit generate made nothing and did not say that nothing is to be made:\n${output.trim()}`)
  } finally {
    await rm(room, { recursive: true, force: true })
  }
}

async function namesBelow(directory) {
  return (await readdir(directory, { recursive: true })).sort()
}
