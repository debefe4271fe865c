import { createHash, randomBytes } from 'node:crypto'
import { chmod, chown, mkdir, rename, rm, stat } from 'node:fs/promises'
import { dirname, join, resolve } from 'node:path'
import { readIfThere, readJson, writeWhole } from './files.mjs'
import { ask, run } from './processes.mjs'
import { Refusal, say, spell } from './say.mjs'

/** The database's own user, in the database; no user of the system has to exist for it. */
export const DATABASE_USER = 'holdover'

/** Kept where the data directory cannot be entered by PostgreSQL's user, as below /root. */
const ELSEWHERE = '/var/lib/holdover'

/**
 * @typedef {{ uid?: number, gid?: number }} Owner who runs PostgreSQL; empty for the present user
 * @typedef {{ directory: string, password: string, port: number | null, owner: Owner, remember: (port: number) => Promise<void> }} Place
 */

/**
 * Where a cluster lives, who runs it and how it is entered; chosen once and remembered in `postgres.json`.
 * @param {string} dataDirectory absolute, exists
 * @returns {Promise<Place>}
 */
export async function findPlace(dataDirectory) {
  const path = join(dataDirectory, 'postgres.json')
  const kept = await readJson(path)
  const owner = await chooseOwner(dataDirectory, kept)
  const near = kept ? true : canEnter(dataDirectory, owner)
  const state = kept ?? {
    directory: near ? 'postgres' : join(ELSEWHERE, createHash('sha256').update(dataDirectory).digest('hex').slice(0, 12), 'postgres'),
    password: randomBytes(24).toString('base64url'),
    port: null,
  }
  const directory = resolve(dataDirectory, state.directory)
  const made = await readIfThere(join(directory, 'PG_VERSION')) !== null
  if (made && !kept) {
    throw new Refusal(`There is a database in ${directory} but ${path}, which holds its password, is missing. Put the file back.`)
  }
  if (made && !canEnter(dirname(directory), owner)) {
    throw new Refusal(`PostgreSQL runs as the user ${owner.uid} and cannot enter ${dirname(directory)} any more. Let it pass with: chmod a+x on that directory and those above it.`)
  }
  if (!near) say(`PostgreSQL's user cannot enter ${dataDirectory}: the database is kept in ${directory}`)
  const save = () => writeWhole(path, `${JSON.stringify(state, null, 2)}\n`)
  if (!kept) await save()
  return {
    directory,
    password: state.password,
    port: state.port,
    owner,
    async remember(port) {
      if (state.port === port) return
      state.port = port
      await save()
    },
  }
}

/** PostgreSQL refuses to run as root: then its data's owner runs it, or the system's user `postgres`. */
async function chooseOwner(dataDirectory, kept) {
  if (process.getuid?.() !== 0) return {}
  const data = await stat(resolve(dataDirectory, kept?.directory ?? 'postgres')).catch(() => null)
  if (data && data.uid !== 0) return { uid: data.uid, gid: data.gid }
  const uid = ask('id', ['-u', 'postgres'])
  const gid = ask('id', ['-g', 'postgres'])
  if (!uid || !gid) throw new Refusal('PostgreSQL does not run as root and there is no user postgres. Make one (useradd --system postgres), run Holdover as another user, or set DATABASE_URL.')
  return { uid: Number(uid), gid: Number(gid) }
}

/** Whether PostgreSQL's user can pass through a directory and all those above it. */
function canEnter(directory, owner) {
  return owner.uid === undefined || ask('test', ['-x', directory], { ...owner, cwd: '/' }) !== null
}

/**
 * Makes the cluster if there is none, whole or not at all.
 * @param {Place} place
 * @param {string} programs directory of the server programs
 */
export async function makeCluster({ directory, password, owner }, programs) {
  if (await readIfThere(join(directory, 'PG_VERSION'))) return
  say(`Making a database in ${directory}`)
  const began = Date.now()
  const draft = `${directory}.new`
  const passwordFile = `${directory}.password`
  await rm(draft, { recursive: true, force: true })
  const first = await mkdir(dirname(draft), { recursive: true })
  // Whatever the umask: PostgreSQL's user passes through these, and nobody looks around in them.
  for (let above = dirname(draft); first && above.length >= first.length; above = dirname(above)) await chmod(above, 0o711)
  await mkdir(draft, { mode: 0o700 })
  await writeWhole(passwordFile, `${password}\n`)
  if (owner.uid !== undefined) {
    await chown(draft, owner.uid, owner.gid)
    await chown(passwordFile, owner.uid, owner.gid)
  }
  // C.UTF-8 sorts alike on every machine and knows the letters of all languages; plain C is everywhere.
  let last
  for (const locale of ['C.UTF-8', 'C']) {
    last = await run(join(programs, 'initdb'), [
      '-D', draft, '-U', DATABASE_USER, `--pwfile=${passwordFile}`, '--auth=scram-sha-256', '--encoding=UTF8', `--locale=${locale}`,
    ], { quiet: true, cwd: '/', ...owner })
    if (last.code === 0) break
  }
  await rm(passwordFile, { force: true })
  if (last.code !== 0) {
    await rm(draft, { recursive: true, force: true })
    throw new Refusal(`initdb failed:\n${last.output.trim().split('\n').slice(-10).join('\n')}`)
  }
  await rename(draft, directory)
  say(`Database made in ${spell(Date.now() - began)}`)
}
