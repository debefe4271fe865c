// The store is this project's own use of unstorage; the bucket is a fake that keeps what it is sent.
import { mkdtemp, readdir, rm } from 'node:fs/promises'
import { createServer } from 'node:http'
import type { Server } from 'node:http'
import type { AddressInfo } from 'node:net'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { openStorage, readBytes, writeBytes } from '../../../server/utils/files/storage'

const hash = 'ab'.repeat(32)
const bytes = Uint8Array.from([0, 1, 2, 253, 254, 255])

describe('the local store', () => {
  let dataDir: string
  beforeAll(async () => { dataDir = await mkdtemp(join(tmpdir(), 'holdover-files-')) })
  afterAll(() => rm(dataDir, { recursive: true, force: true }))

  it('gives back the bytes that it was given, and null for others', async () => {
    const storage = openStorage({ dataDir })
    await writeBytes(storage, hash, bytes)
    expect([...(await readBytes(openStorage({ dataDir }), hash))!]).toEqual([...bytes])
    expect(await readBytes(storage, 'cd'.repeat(32))).toBeNull()
    expect(await readdir(join(dataDir, 'files'))).toEqual(['ab'])
  })
})

describe('a bucket', () => {
  let server: Server
  const held = new Map<string, Buffer>()
  const signed: string[] = []
  beforeAll(async () => {
    server = createServer((request, response) => {
      signed.push(request.headers.authorization ?? '')
      const chunks: Buffer[] = []
      request.on('data', (chunk: Buffer) => chunks.push(chunk)).on('end', () => {
        if (request.method === 'PUT') held.set(request.url!, Buffer.concat(chunks))
        const found = held.get(request.url!)
        response.writeHead(found ? 200 : 404).end(request.method === 'GET' ? found : undefined)
      })
    })
    await new Promise<void>(resolve => server.listen(0, '127.0.0.1', resolve))
  })
  afterAll(() => new Promise(resolve => server.close(resolve)))
  const settings = () => ({ dataDir: '/nowhere', HOLDOVER_S3_BUCKET: 'records', HOLDOVER_S3_ENDPOINT: `http://127.0.0.1:${(server.address() as AddressInfo).port}`, HOLDOVER_S3_REGION: 'auto', HOLDOVER_S3_ACCESS_KEY_ID: 'id', HOLDOVER_S3_SECRET_ACCESS_KEY: 'secret' })

  it('is used where one is named, with signed requests', async () => {
    await writeBytes(openStorage(settings()), hash, bytes)
    expect([...held.keys()]).toEqual([`/records/ab/${hash}`])
    expect([...(await readBytes(openStorage(settings()), hash))!]).toEqual([...bytes])
    expect(await readBytes(openStorage(settings()), 'cd'.repeat(32))).toBeNull()
    expect(signed.every(header => header.startsWith('AWS4-HMAC-SHA256 Credential=id/'))).toBe(true)
  })

  it('is refused at once where its keys are missing', () => {
    expect(() => openStorage({ ...settings(), HOLDOVER_S3_SECRET_ACCESS_KEY: '' })).toThrow(/HOLDOVER_S3_SECRET_ACCESS_KEY/)
  })
})
