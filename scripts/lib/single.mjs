import { rm } from 'node:fs/promises'
import { join } from 'node:path'
import { readIfThere, writeWhole } from './files.mjs'
import { birthOf, isAlive, onClose, waitUntilGone } from './processes.mjs'
import { Refusal } from './say.mjs'

/**
 * Lets one start command at a time use a data directory: a second would stop the first one's database when it ends.
 * @param {string} dataDirectory absolute, exists
 * @throws {Refusal} when another is running
 */
export async function claimDataDirectory(dataDirectory) {
  const path = join(dataDirectory, 'start.pid')
  const [pid, birth] = (await readIfThere(path) ?? '').trim().split(/ (.*)/s)
  const sameLives = pid && Number(pid) !== process.pid && isAlive(Number(pid)) && birthOf(Number(pid)) === birth
  // The other may be ending at this moment.
  if (sameLives && !await waitUntilGone(Number(pid), 5_000)) {
    throw new Refusal(`Holdover already runs on ${dataDirectory} (process ${pid}). Stop it first, or give this one another HOLDOVER_DATA.`)
  }
  await writeWhole(path, `${process.pid} ${birthOf(process.pid)}\n`)
  onClose(() => rm(path, { force: true }))
}
