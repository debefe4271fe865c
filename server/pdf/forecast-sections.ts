import { clockWords, countWords, numberWords } from '../../shared/charts/words'
import { isoTime } from '../../shared/record/entry'
import { differenceOf, differenceWords } from '../../shared/record/forecast-summary'
import type { RecordPaper } from './record'
import type { Sheet } from './sheet'
import { drawTable } from './table'

/** Rounds that stand side by side. */
const ROUNDS_ACROSS = 9

/** What the fits foretold against what came: by case, then the difference of each reading. */
export async function drawForecasts(sheet: Sheet, { summary }: RecordPaper): Promise<void> {
  const { cases, unit, readings } = summary.forecasts
  if (readings === 0) return
  sheet.begin('Forecast against what came')
  sheet.paragraph(`Each reading without control is set beside what the fit to the readings before it foretold for that moment; differences are came less foretold, °${unit}. A case came early when it was found over its limit before the careful forecast had it there.`)
  await drawTable(sheet, [{ label: 'Case', width: 1 }, { label: 'Readings', width: 52, align: 'right' }, { label: 'Median', width: 46, align: 'right' }, { label: 'Largest', width: 46, align: 'right' }, { label: 'Came early', width: 58 }],
    cases.map(item => [item.name, String(item.lines.length), numberWords(item.median), differenceWords(item.largest), item.early ? 'yes' : 'no']))
  const most = Math.max(...cases.map(item => item.lines.length))
  for (let from = 0; from < most; from += ROUNDS_ACROSS) {
    const across = Array.from({ length: Math.min(ROUNDS_ACROSS, most - from) }, (_, index) => from + index)
    sheet.heading(`Differences, °${unit}, ${across.length === 1 ? `reading ${from + 1}` : `readings ${from + 1} to ${from + across.length}`} of each case`)
    await drawTable(sheet, [{ label: 'Case', width: 1 }, ...across.map(index => ({ label: String(index + 1), width: 42, align: 'right' as const }))],
      cases.filter(item => item.lines.length > from).map(item => [item.name, ...across.map((index) => { const line = item.lines[index]; return line ? differenceWords(differenceOf(line)) : '' })]))
  }
}

/** Warnings of the plant as they came and went. */
export async function drawPlantWarnings(sheet: Sheet, { summary }: RecordPaper): Promise<void> {
  if (summary.plantWarnings.length === 0) return
  sheet.heading(countWords(summary.plantWarnings.length, 'plant warning'))
  await drawTable(sheet, [{ label: 'No.', width: 26 }, { label: 'Time', width: 50 }, { label: 'What was seen', width: 0.6 }, { label: 'What to do', width: 0.4 }],
    summary.plantWarnings.map(line => [String(line.seq), clockWords(isoTime(line.at), summary.heading.timeZone, true), line.words, line.over ? 'over' : line.act]))
}
