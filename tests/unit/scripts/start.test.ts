// How the start command finds, makes and refuses things; the rules are this project's own.
import { chmod, mkdir, mkdtemp, readFile, rm, stat, writeFile } from 'node:fs/promises'
import { createServer } from 'node:net'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { afterEach, beforeEach, describe, expect, it } from 'vitest'
import { hashOf, makeDataDirectory, readJson } from '../../../scripts/lib/files.mjs'
import { checkNode } from '../../../scripts/lib/install.mjs'
import { claimPort } from '../../../scripts/lib/ports.mjs'
import { findServerPrograms } from '../../../scripts/lib/postgres-programs.mjs'
import { spell } from '../../../scripts/lib/say.mjs'
import { loadSecrets } from '../../../scripts/lib/secrets.mjs'
import { claimDataDirectory } from '../../../scripts/lib/single.mjs'
import { installSystemPackages } from '../../../scripts/lib/system.mjs'

let room: string

beforeEach(async () => {
  room = await mkdtemp(join(tmpdir(), 'holdover-start-'))
})
afterEach(() => rm(room, { recursive: true, force: true }))

/** Writes programs that do nothing or what they are told. */
async function writePrograms(directory: string, programs: Record<string, string>) {
  await mkdir(directory, { recursive: true })
  for (const [name, text] of Object.entries(programs)) {
    await writeFile(join(directory, name), `#!/bin/sh\n${text}\n`)
    await chmod(join(directory, name), 0o755)
  }
}

describe('checkNode', () => {
  it.each(['18.20.4', '20.18.0', '22.11.0'])('refuses Node %s and says what is needed', (version) => {
    expect(() => checkNode(version)).toThrow(`Holdover needs Node 20.19 or a later 20; this is Node ${version}.`)
  })

  it('accepts Node 20.19 and later', () => {
    expect(() => ['20.19.0', '20.20.2'].forEach(version => checkNode(version))).not.toThrow()
  })
})

describe('findServerPrograms', () => {
  it('takes the newest of the packaged versions', async () => {
    for (const version of ['9', '15', '17']) await writePrograms(join(room, version, 'bin'), { postgres: '', initdb: '' })
    expect(findServerPrograms({ debian: room, path: '' })).toBe(join(room, '17/bin'))
  })

  it('takes the version that made the data', async () => {
    for (const version of ['15', '17']) await writePrograms(join(room, version, 'bin'), { postgres: '', initdb: '' })
    expect(findServerPrograms({ major: '15', debian: room, path: '' })).toBe(join(room, '15/bin'))
    expect(findServerPrograms({ major: '16', debian: room, path: '' })).toBeNull()
  })

  it('passes over a client without a server, and looks in PATH', async () => {
    await writePrograms(join(room, 'packaged/17/bin'), { psql: '' })
    await writePrograms(join(room, 'own'), { postgres: '', initdb: '' })
    expect(findServerPrograms({ debian: join(room, 'packaged'), path: `/nowhere:${room}/own` })).toBe(join(room, 'own'))
    expect(findServerPrograms({ debian: join(room, 'packaged'), path: '/nowhere' })).toBeNull()
  })
})

describe('installSystemPackages', () => {
  it('updates and installs as root', async () => {
    await writePrograms(join(room, 'bin'), { 'apt-get': `echo "$@" >> ${room}/calls` })
    await installSystemPackages(['postgresql', 'qpdf'], 'Needed', { uid: 0, path: join(room, 'bin') })
    expect(await readFile(join(room, 'calls'), 'utf8')).toBe('update -qq\ninstall -y -qq --no-install-recommends postgresql qpdf\n')
  })

  it('tells another user what to install', async () => {
    await writePrograms(join(room, 'bin'), { 'apt-get': 'exit 1' })
    await expect(installSystemPackages(['qpdf'], 'The tests need qpdf', { uid: 1000, path: join(room, 'bin') }))
      .rejects.toThrow('The tests need qpdf. Install with: sudo apt-get install qpdf.')
  })

  it('tells what to install where there is no apt-get', async () => {
    await expect(installSystemPackages(['qpdf'], 'The tests need qpdf', { uid: 0, path: room }))
      .rejects.toThrow('The tests need qpdf. Install qpdf by the means of this system.')
  })

  it('passes on what apt-get said when it fails', async () => {
    await writePrograms(join(room, 'bin'), { 'apt-get': 'echo "E: no such package"; exit 100' })
    await expect(installSystemPackages(['qpdf'], 'Needed', { uid: 0, path: `${join(room, 'bin')}:/bin` })).rejects.toThrow('E: no such package')
  })
})

describe('loadSecrets', () => {
  it('makes two secrets of 32 bytes once, for the owner alone', async () => {
    const secrets = await loadSecrets(room, {})
    expect(Object.keys(secrets)).toEqual(['NUXT_AUTH_SECRET', 'HOLDOVER_SERVER_KEY'])
    expect(Object.values(secrets).map(text => Buffer.from(text, 'base64url').length)).toEqual([32, 32])
    expect((await stat(join(room, 'secrets.json'))).mode & 0o777).toBe(0o600)
    expect(await loadSecrets(room, {})).toEqual(secrets)
  })

  it('takes what the environment gives and keeps nothing of it', async () => {
    const given = { NUXT_AUTH_SECRET: 'a', HOLDOVER_SERVER_KEY: 'b' }
    expect(await loadSecrets(room, given)).toEqual(given)
    expect(await readJson(join(room, 'secrets.json'))).toBeNull()
  })

  it('writes nothing over a file that it cannot read', async () => {
    await writeFile(join(room, 'secrets.json'), '{"NUXT_AUTH_SECRET":')
    await expect(loadSecrets(room, {})).rejects.toThrow('cannot be read')
    expect(await readFile(join(room, 'secrets.json'), 'utf8')).toBe('{"NUXT_AUTH_SECRET":')
  })
})

describe('claimPort', () => {
  it.each(['0', 'abc', '70000', '-1', '3000.5'])('refuses the port %s', async (text) => {
    await expect(claimPort('127.0.0.1', text)).rejects.toThrow('must be a whole number from 1 to 65535')
  })

  it('says when a port is taken', async () => {
    const other = createServer().listen(0, '127.0.0.1')
    await new Promise(resolve => other.once('listening', resolve))
    const { port } = other.address() as { port: number }
    try {
      await expect(claimPort('127.0.0.1', String(port))).rejects.toThrow(`Port ${port} of 127.0.0.1 is taken by another program.`)
    } finally {
      other.close()
    }
    expect(await claimPort('127.0.0.1', String(port))).toBe(port)
  }, 15_000)

  it('says when the address is not of this machine', async () => {
    await expect(claimPort('192.0.2.1', '3000')).rejects.toThrow('HOST is 192.0.2.1, which is no address of this machine.')
  })
})

describe('the data directory', () => {
  it('is made so that others pass through it and look at nothing', async () => {
    const directory = join(room, 'deep/data')
    await makeDataDirectory(directory)
    expect((await stat(directory)).mode & 0o777).toBe(0o711)
  })

  it('is refused where it cannot be made', async () => {
    await writeFile(join(room, 'file'), '')
    await expect(makeDataDirectory(join(room, 'file'))).rejects.toThrow('Set HOLDOVER_DATA to a directory that you may write to.')
  })

  it('serves a new start after one that was killed', async () => {
    await writeFile(join(room, 'start.pid'), '1 a-birth-that-no-process-had\n')
    await claimDataDirectory(room)
    expect(await readFile(join(room, 'start.pid'), 'utf8')).toMatch(new RegExp(`^${process.pid} `))
  })
})

describe('hashOf', () => {
  it('changes with a name and with a content, and not otherwise', async () => {
    await mkdir(join(room, 'app/deep'), { recursive: true })
    await writeFile(join(room, 'app/deep/a.ts'), '1')
    const names = ['app', 'missing', 'nuxt.config.ts']
    const first = await hashOf(room, names)
    expect(await hashOf(room, names)).toBe(first)
    await writeFile(join(room, 'app/deep/a.ts'), '2')
    const second = await hashOf(room, names)
    await writeFile(join(room, 'nuxt.config.ts'), '')
    expect(new Set([first, second, await hashOf(room, names)]).size).toBe(3)
  })
})

describe('spell', () => {
  it('writes times as people read them', () => {
    expect([40, 12_400, 185_000].map(spell)).toEqual(['0.0 s', '12 s', '3 min 05 s'])
  })
})
