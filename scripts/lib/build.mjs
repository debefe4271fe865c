import { existsSync } from 'node:fs'
import { join } from 'node:path'
import { hashOf, readIfThere, writeWhole } from './files.mjs'
import { run } from './processes.mjs'
import { Refusal, say, spell } from './say.mjs'

/** All that the built server is made of. */
const SOURCES = ['app', 'server', 'shared', 'public', 'nuxt.config.ts', 'tailwind.config.ts', 'package-lock.json']

/**
 * Builds the server, unless what was built last is of the same sources.
 * @param {string} root the project's directory, absolute
 */
export async function buildServer(root) {
  const stamp = join(root, '.output/.holdover-build')
  // Taken before the build: a file changed while it runs is built again next time.
  const wanted = `${await hashOf(root, SOURCES)}\n`
  if (await readIfThere(stamp) === wanted && existsSync(join(root, '.output/server/index.mjs'))) {
    say('The server is built')
    return
  }
  say('Building the server (half a minute or so)')
  const began = Date.now()
  const { code, output } = await run(process.execPath, [join(root, 'node_modules/nuxt/bin/nuxt.mjs'), 'build'], {
    cwd: root,
    quiet: true,
    env: { ...process.env, NODE_ENV: 'production', NUXT_TELEMETRY_DISABLED: '1' },
  })
  if (code !== 0) throw new Refusal(`The build failed:\n${tellFault(output)}`)
  await writeWhole(stamp, wanted, 0o644)
  say(`Built in ${spell(Date.now() - began)}`)
}

/** The lines of a build's output from its first error on; its last lines when it names none. */
function tellFault(output) {
  const lines = output.trim().split('\n')
  const first = lines.findIndex(line => /\berror\b/i.test(line))
  return first >= 0 ? lines.slice(first, first + 25).join('\n') : lines.slice(-25).join('\n')
}
