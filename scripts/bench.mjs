// `npm run bench`: runs every `bench/*.bench.ts` or `.mjs` by itself and prints one JSON document of what they measured.
// Names after it choose some: `npm run bench -- canonical`.
import { readdir, rm } from 'node:fs/promises'
import { cpus } from 'node:os'
import { join } from 'node:path'
import { fileURLToPath } from 'node:url'
import { bundle } from './lib/bundle.mjs'
import { closeAll, closeOnSignals, run } from './lib/processes.mjs'

const root = fileURLToPath(new URL('..', import.meta.url)).replace(/\/$/, '')
// Below node_modules, so that what is not bundled is found from there.
const room = join(root, 'node_modules/.cache/holdover-bench')

/** Runs one benchmark. @returns {Promise<object>} the JSON of its last line, or its fault */
async function measure(file) {
  const { code, output } = await run(process.execPath, [await bundle(root, `bench/${file}`, room)], { cwd: root, quiet: true, timeout: 10 * 60_000 })
  try {
    if (code !== 0) throw new Error(`exit code ${code}`)
    const result = JSON.parse(output.trim().split('\n').at(-1))
    if (typeof result.name !== 'string' || typeof result.ratio !== 'number') throw new Error('the last line holds no name and ratio')
    return result
  } catch (error) {
    return { name: file, fault: error.message, output: output.trim().split('\n').slice(-10) }
  }
}

closeOnSignals(130)
const chosen = process.argv.slice(2)
const known = (await readdir(join(root, 'bench'))).filter(file => /\.bench\.(ts|mjs)$/.test(file)).sort()
const files = known.filter(file => chosen.length === 0 || chosen.some(name => file.startsWith(name)))
if (files.length === 0) process.stderr.write(`No such benchmark. There are: ${known.join(', ')}\n`)
await rm(room, { recursive: true, force: true })
const benches = []
// One after another: two at once would measure each other.
for (const file of files) benches.push(await measure(file))
await rm(room, { recursive: true, force: true })
process.stdout.write(`${JSON.stringify({ node: process.versions.node, processor: cpus()[0]?.model, processors: cpus().length, benches }, null, 2)}\n`)
await closeAll()
process.exit(files.length > 0 && benches.every(bench => !bench.fault) ? 0 : 1)
