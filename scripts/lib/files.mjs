import { createHash } from 'node:crypto'
import { access, chmod, constants, mkdir, open, readFile, readdir, rename, stat } from 'node:fs/promises'
import { join } from 'node:path'
import { Refusal } from './say.mjs'

/** The text of a file, or null when there is none. */
export async function readIfThere(path) {
  try {
    return await readFile(path, 'utf8')
  } catch (error) {
    if (error.code === 'ENOENT' || error.code === 'ENOTDIR') return null
    throw error
  }
}

/**
 * Reads a JSON file; null when there is none.
 * @throws {Refusal} when it is not JSON: it holds what cannot be made again, so nothing is written over it
 */
export async function readJson(path) {
  try {
    return JSON.parse(await readIfThere(path) ?? 'null')
  } catch (error) {
    throw new Refusal(`${path} cannot be read (${error.message}). Put the file back as it was.`)
  }
}

/** Writes a file whole or not at all, readable by its owner alone unless told otherwise. */
export async function writeWhole(path, text, mode = 0o600) {
  const draft = `${path}.${process.pid}.new`
  const file = await open(draft, 'w', mode)
  try {
    await file.writeFile(text)
    await file.sync()
  } finally {
    await file.close()
  }
  await rename(draft, path)
}

/**
 * Makes the data directory if it is missing: others may pass through it (PostgreSQL's user must), not look around.
 * @param {string} directory absolute
 */
export async function makeDataDirectory(directory) {
  try {
    const first = await mkdir(directory, { recursive: true })
    if (first) await chmod(directory, 0o711)
    if (!(await stat(directory)).isDirectory()) throw new Error('not a directory')
    await access(directory, constants.W_OK)
  } catch (error) {
    throw new Refusal(`The data directory ${directory} cannot be used (${error.code ?? error.message}). Set HOLDOVER_DATA to a directory that you may write to.`)
  }
}

/**
 * One hash for the names and contents of files and of all that lies below directories.
 * @param {string} root
 * @param {string[]} names relative to root; what is missing counts as missing
 * @returns {Promise<string>} SHA-256, hex
 */
export async function hashOf(root, names) {
  const hash = createHash('sha256')
  for (const name of names) {
    for (const path of await filesBelow(root, name)) {
      const bytes = await readFile(join(root, path)).catch(() => '')
      hash.update(`${path}\0${bytes.length}\0`).update(bytes)
    }
  }
  return hash.digest('hex')
}

/** All files at or below a path, sorted by name. */
async function filesBelow(root, name) {
  const found = await stat(join(root, name)).catch(() => null)
  if (!found) return []
  if (!found.isDirectory()) return [name]
  const below = await readdir(join(root, name), { recursive: true, withFileTypes: true })
  return below.filter(entry => entry.isFile())
    .map(entry => join(entry.parentPath ?? entry.path, entry.name).slice(root.length + 1))
    .sort()
}
