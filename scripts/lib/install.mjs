import { join } from 'node:path'
import { hashOf, readIfThere, writeWhole } from './files.mjs'
import { run } from './processes.mjs'
import { Refusal, say, spell } from './say.mjs'

/**
 * Refuses a Node that the packages do not run on.
 * @param {string} [version] such as `20.20.2`
 */
export function checkNode(version = process.versions.node) {
  const [major, minor] = version.split('.').map(Number)
  if (major !== 20 || minor < 19) {
    throw new Refusal(`Holdover needs Node 20.19 or a later 20; this is Node ${version}.`)
  }
  say(`Node ${version}`)
}

/**
 * Installs the packages of the lock file, unless the last install was of the same file by the same Node.
 * @param {string} root the project's directory, absolute
 */
export async function installPackages(root) {
  const stamp = join(root, 'node_modules/.holdover-install')
  const wanted = `${await hashOf(root, ['package-lock.json', 'tools'])} ${process.versions.modules} ${process.platform}-${process.arch}\n`
  if (await readIfThere(stamp) === wanted) {
    say('Packages are installed')
    return
  }
  say('Installing packages from package-lock.json (a minute or two)')
  const began = Date.now()
  const { code, output } = await run('npm', ['ci', '--include=dev', '--no-audit', '--no-fund'], {
    cwd: root,
    quiet: true,
    // Tests use the system's Chromium, and nothing is told to anybody.
    env: { ...process.env, PLAYWRIGHT_SKIP_BROWSER_DOWNLOAD: '1', NUXT_TELEMETRY_DISABLED: '1' },
  })
  if (code !== 0) throw new Refusal(`npm ci failed:\n${output.trim().split('\n').slice(-25).join('\n')}`)
  await writeWhole(stamp, wanted, 0o644)
  say(`Packages installed in ${spell(Date.now() - began)}`)
}
