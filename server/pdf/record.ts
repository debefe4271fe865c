import type { StoredEntry } from '../../shared/record/entry'
import { logRoot } from '../../shared/record/merkle'
import { temperatureCharts } from '../../shared/record/record-charts'
import type { OutageState } from '../../shared/record/state'
import type { RecordSummary } from '../../shared/record/summary'
import { hashWords } from '../../shared/record/summary-words'
import { temperatureWords } from '../../shared/charts/words'
import { drawTemperatures } from './charts'
import { drawEntries, drawLooseEnds } from './entry-sections'
import { Feet } from './foot'
import type { FontBytes } from './fonts'
import { drawForecasts, drawPlantWarnings } from './forecast-sections'
import { drawFront } from './front'
import { drawPhotos } from './photos'
import { drawChecks, drawDarks, drawPlan } from './plan-sections'
import { drawCautions, drawProof, drawVerifying } from './proof'
import { drawPoints, drawRounds } from './run-sections'
import { Sheet } from './sheet'
import { Typesetter } from './typesetter'
import type { PaperVariant } from './variant'
import { attachRecord, openDocument } from './variant'
import { drawInstruments, drawVerdicts } from './verdict-sections'

/** All that the paper is made from; the same input makes the same bytes. */
export interface RecordPaper {
  state: OutageState
  entries: readonly StoredEntry[]
  summary: RecordSummary
  /** when the last entry was received, Unix ms: the date of the document */
  now: number
  /** seq → its signature fits its signer's key */
  verified: ReadonlyMap<number, boolean>
  /** whether the sealed root is that of the entries; null where there is no seal */
  sealHolds: boolean | null
  /** drawn signatures by hash, as PNG or JPEG without transparency */
  drawings: ReadonlyMap<string, Uint8Array>
  /** hashes of the files that the store holds */
  held: ReadonlySet<string>
  /** gives a photo as a small JPEG when it is drawn; null where its bytes cannot be had */
  picture: (hash: string) => Promise<Uint8Array | null>
  variant: PaperVariant
  /** record.json, which a paper of the variant `record` carries */
  record: string
}

const CHART_HEIGHT = 168

/**
 * Starts the document. It is a stream to be read at once; `written` ends when all has been drawn.
 * @throws nothing itself: `written` rejects, and the stream then ends with the same error
 */
export function openRecordPdf(paper: RecordPaper, fonts: FontBytes): { doc: PDFKit.PDFDocument, written: Promise<void> } {
  const { heading } = paper.summary
  const title = `Record of a controller outage${heading.code ? ` ${heading.code}` : ''}: ${heading.site}, ${heading.controller}`
  const subject = `${heading.planned ? heading.work : 'unplanned outage'}, ${heading.site}`
  const doc = openDocument(paper.variant, paper.state.snapshot.site.paper, { title, subject, date: paper.now })
  if (paper.variant === 'record') attachRecord(doc, paper.record, paper.now)
  const written = draw(doc, paper, fonts)
  written.catch((error: unknown) => doc.destroy(error instanceof Error ? error : new Error(String(error))))
  return { doc, written }
}

async function draw(doc: PDFKit.PDFDocument, paper: RecordPaper, fonts: FontBytes): Promise<void> {
  const type = new Typesetter(doc, fonts)
  const root = paper.state.sealed ? `seal ${hashWords(paper.state.sealed.root)}` : `not sealed, root ${hashWords(logRoot(paper.entries))}`
  const feet = new Feet(doc, type, `${paper.summary.heading.code ?? 'not numbered'} · ${root}`)
  const sheet = new Sheet(doc, type, paper.state.snapshot.site.paper, feet)
  drawFront(sheet, paper)
  drawCharts(sheet, paper)
  await drawPlan(sheet, paper)
  await drawChecks(sheet, paper)
  await drawPoints(sheet, paper)
  await drawDarks(sheet, paper)
  await drawRounds(sheet, paper)
  await drawPlantWarnings(sheet, paper)
  await drawForecasts(sheet, paper)
  await drawVerdicts(sheet, paper)
  await drawInstruments(sheet, paper)
  await drawLooseEnds(sheet, paper)
  await drawEntries(sheet, paper)
  await drawPhotos(sheet, paper)
  await drawProof(sheet, paper)
  drawCautions(sheet, paper)
  drawVerifying(sheet, paper)
  sheet.end()
  feet.end()
  doc.end()
}

function drawCharts(sheet: Sheet, { state, summary, now }: RecordPaper): void {
  for (const chart of temperatureCharts(state, now)) {
    sheet.begin(`Product temperatures, °${chart.unit}`, CHART_HEIGHT, `Product temperatures, limit ${temperatureWords(chart.limit, chart.unit)}`)
    drawTemperatures(sheet, chart, summary.heading.timeZone, CHART_HEIGHT)
    if (chart.left > 0) sheet.paragraph(`Drawn: the ${chart.cases.length} cases that came nearest to their limit; ${chart.left} more stand in the tables.`, { style: { size: 7.5 } })
  }
}
