// Pages of a record's PDF in a second beside the words of its entries by pdfkit alone; and memory of 2,000 entries beside 200.
import { mkdtemp, rm, writeFile } from 'node:fs/promises'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { recordText } from '~~/shared/record/record-document'
import type { PaperRun } from '../tests/support/paper-process'
import { paperProcess } from '../tests/support/paper-process'
import { documentOf, longRecord } from './long-record'

const TURNS = 3

const room = await mkdtemp(join(tmpdir(), 'holdover-bench-paper-'))
try {
  const make = await paperProcess()
  const pathOf = async (size: number) => {
    const path = join(room, `${size}.json`)
    await writeFile(path, recordText(documentOf(longRecord(size))))
    return path
  }
  const [short, long] = [await pathOf(200), await pathOf(2_000)]
  /** The run of middle length. */
  const median = async (path: string, how?: 'bare') => {
    const runs: PaperRun[] = []
    for (let turn = 0; turn < TURNS; turn += 1) runs.push(await make(path, how))
    return runs.sort((a, b) => a.ms - b.ms)[Math.floor(TURNS / 2)]!
  }
  const [small, large, bare] = [await median(short), await median(long), await median(long, 'bare')]
  const perSecond = ({ pages, ms }: PaperRun) => pages * 1_000 / ms
  process.stdout.write(`${JSON.stringify({
    name: 'a page of the PDF of 2,000 entries',
    ratio: Number((perSecond(bare) / perSecond(large)).toFixed(2)),
    baseline: 'a page of the words of the same entries by pdfkit alone, one under another, in the same font',
    pages: large.pages,
    milliseconds: large.ms,
    pagesPerSecond: Number(perSecond(large).toFixed(1)),
    barePages: bare.pages,
    barePagesPerSecond: Number(perSecond(bare).toFixed(1)),
    peakMegabytes: large.peakMb,
    peakMegabytesOf200: small.peakMb,
    peakTimesThatOf200: Number((large.peakMb / small.peakMb).toFixed(2)),
  })}\n`)
} finally {
  await rm(room, { recursive: true, force: true })
}
