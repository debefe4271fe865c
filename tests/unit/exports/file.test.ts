// A file in parts and a ZIP made as it is read; promises of this project's own. The ZIP is opened by PKWARE's APPNOTE 6.3.10.
import { createStorage } from 'unstorage'
import { describe, expect, it } from 'vitest'
import { hasParts, PART_BYTES, readParts, removeParts, writeParts } from '../../../server/utils/exports/parts'
import { zipOf } from '../../../server/utils/exports/zip'
import { unzip } from '../../support/unzip'

async function collect(chunks: AsyncIterable<Uint8Array>): Promise<Buffer> {
  const all: Uint8Array[] = []
  for await (const chunk of chunks) all.push(chunk)
  return Buffer.concat(all)
}

async function* chunksOf(...chunks: Uint8Array[]): AsyncGenerator<Uint8Array> {
  await Promise.resolve()
  yield* chunks
}

describe('a file in parts', () => {
  it('is cut into parts of one size, whatever the chunks are, and comes back as it was', async () => {
    const storage = createStorage()
    const first = Buffer.alloc(PART_BYTES + 1, 1)
    const second = Buffer.alloc(PART_BYTES, 2)
    expect(await writeParts(storage, 'x', 1, chunksOf(first, second, Buffer.from('end')))).toEqual({ parts: 3, bytes: 2 * PART_BYTES + 4 })
    expect(Buffer.compare(await collect(readParts(storage, 'x', 1, 3)), Buffer.concat([first, second, Buffer.from('end')]))).toBe(0)
  })

  it('of a whole number of parts has no empty one, and an empty file has none', async () => {
    const storage = createStorage()
    expect(await writeParts(storage, 'x', 1, chunksOf(Buffer.alloc(PART_BYTES)))).toEqual({ parts: 1, bytes: PART_BYTES })
    expect(await writeParts(storage, 'y', 1, chunksOf())).toEqual({ parts: 0, bytes: 0 })
  })

  it('is not given where a part is missing', async () => {
    const storage = createStorage()
    await writeParts(storage, 'x', 1, chunksOf(Buffer.from('abc')))
    expect([await hasParts(storage, 'x', 1, 1), await hasParts(storage, 'x', 1, 2), await hasParts(storage, 'x', 2, 1)]).toEqual([true, false, false])
    await expect(collect(readParts(storage, 'x', 1, 2))).rejects.toThrow('Part 1')
  })

  it('goes with all its tries but the one that is kept', async () => {
    const storage = createStorage()
    for (const attempt of [1, 2, 3]) await writeParts(storage, 'x', attempt, chunksOf(Buffer.from(`try ${attempt}`)))
    await writeParts(storage, 'other', 1, chunksOf(Buffer.from('other')))
    await removeParts(storage, 'x', 3, 2)
    expect((await storage.getKeys()).sort()).toEqual(['exports:other:1:000000', 'exports:x:2:000000'])
    await removeParts(storage, 'x', 3)
    expect(await storage.getKeys()).toEqual(['exports:other:1:000000'])
  })
})

describe('a ZIP made as it is read', () => {
  const at = new Date(Date.UTC(2026, 2, 3, 2, 24))

  it('opens again whole, its files in the order given, each made once the one before it was read', async () => {
    const made: string[] = []
    const files = ['a.pdf', 'b.pdf', 'index.csv'].map(name => ({ name, at, make: async () => {
      made.push(name)
      return Buffer.from(`${made.length} ${name} `.repeat(50_000))
    } }))
    const found = unzip(await collect(zipOf(files)))
    expect([...found.keys()]).toEqual(['a.pdf', 'b.pdf', 'index.csv'])
    expect(found.get('index.csv')!.toString()).toBe('3 index.csv '.repeat(50_000))
    expect(made).toEqual(['a.pdf', 'b.pdf', 'index.csv'])
  })

  it('ends with what a file throws, and makes none after it', async () => {
    const made: string[] = []
    const file = (name: string, make: () => Promise<Uint8Array>) => ({ name, at, make: () => {
      made.push(name)
      return make()
    } })
    const files = [file('a', async () => Buffer.from('a')), file('b', async () => Promise.reject(new Error('the record is gone'))), file('c', async () => Buffer.from('c'))]
    await expect(collect(zipOf(files))).rejects.toThrow('the record is gone')
    expect(made).toEqual(['a', 'b'])
  })

  it('can be left in the middle', async () => {
    const files = ['a', 'b'].map(name => ({ name, at, make: async () => Buffer.alloc(2_000_000, name) }))
    for await (const chunk of zipOf(files)) {
      expect(chunk.length).toBeGreaterThan(0)
      break
    }
  })
})
