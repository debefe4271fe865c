import { clockWords, minuteWords, temperatureWords } from '../../shared/charts/words'
import { unreadCases } from '../../shared/record/attention'
import { isoTime } from '../../shared/record/entry'
import { accuracyWords, dayWords, doubtWords } from '../../shared/record/instrument-words'
import { VERDICT_WORDS } from '../../shared/record/kinds/server'
import type { VerdictLine } from '../../shared/record/record-lines'
import { actDetail } from '../../shared/record/summary-words'
import { localWhy } from '../../shared/record/why-words'
import type { RecordPaper } from './record'
import type { Sheet } from './sheet'
import { drawTable } from './table'

/** Verdicts but those that were only unknown for a while and within again. */
function tellingVerdicts(verdicts: readonly VerdictLine[]): VerdictLine[] {
  const before = new Map<string, VerdictLine['verdict']>()
  return verdicts.filter((line) => {
    const known = before.get(line.caseId) ?? 'within'
    if (line.verdict !== 'unknown') before.set(line.caseId, line.verdict)
    return line.verdict !== 'unknown' && line.verdict !== known
  })
}

/** Verdicts as they changed, and what was done about them. */
export async function drawVerdicts(sheet: Sheet, { summary, state }: RecordPaper): Promise<void> {
  const { timeZone } = summary.heading
  const clock = (at: number) => clockWords(isoTime(at), timeZone, true)
  sheet.begin('Verdicts and acts')
  sheet.paragraph(`Judged by ${state.snapshot.rulebook.name}, version ${state.snapshot.rulebook.version}. A verdict is entered when it changes; until the first one a case is within its limit.`)
  const telling = tellingVerdicts(summary.verdicts)
  if (telling.length > 0) {
    await drawTable(sheet, [{ label: 'No.', width: 26 }, { label: 'Time', width: 46 }, { label: 'Case', width: 0.26 }, { label: 'Verdict', width: 0.3 }, { label: 'Gets worse', width: 50 }, { label: 'Rule', width: 0.44 }],
      telling.map(line => [String(line.seq), clock(line.at), line.name, `${VERDICT_WORDS[line.verdict]}${line.minutesAbove > 0 ? `, ${minuteWords(line.minutesAbove)} above` : ''}`, line.deadline === null ? '' : clock(line.deadline), whyOf(line, timeZone)]))
  } else {
    sheet.paragraph('No case was found above its limit.')
  }
  const unread = unreadCases(summary)
  if (unread.length > 0) { sheet.y += 4; sheet.paragraph(`Not known for a while, for want of a reading in time: ${unread.map(({ words }) => words).join(', ')}. Each such verdict stands among the entries.`) }
  if (summary.acts.length > 0) {
    sheet.heading('Acts')
    await drawTable(sheet, [{ label: 'No.', width: 26 }, { label: 'Time', width: 46 }, { label: 'Case', width: 0.26 }, { label: 'Act', width: 0.26 }, { label: 'Product, quantity, place', width: 0.48 }, { label: 'By', width: 78 }],
      summary.acts.map(act => [String(act.seq), clock(act.at), act.name, act.act, actDetail(act), act.by]))
  }
  if (summary.openings.length > 0) {
    sheet.heading('Acts asked for')
    await drawTable(sheet, [{ label: 'No.', width: 26 }, { label: 'Time', width: 46 }, { label: 'Case', width: 0.26 }, { label: 'Why', width: 0.34 }, { label: 'Ended', width: 0.4 }],
      summary.openings.map(line => [String(line.seq), clock(line.at), line.name, line.cause, line.ended ? `${clock(line.ended.at)}, ${line.ended.how} (No. ${line.ended.seq})` : `still open: ${line.ends}`]))
  }
  for (const line of summary.decidedOtherwise) { sheet.y += 4; sheet.paragraph(`No. ${line.seq}, ${clock(line.at)}: for ${line.name} ${line.by} decided otherwise: ${[line.clause, line.reason].filter(Boolean).join(', ')}`) }
}

/** Why a verdict was given, in the site's time, and what was to be done. */
function whyOf({ why, source, clause, act, at }: VerdictLine, timeZone: string): string {
  const reasons = why.length > 0 ? why.map(reason => localWhy(reason, timeZone, at)) : [`${source}, ${clause}.`]
  return [...reasons, act ?? ''].filter(Boolean).join(' ')
}

/** Every thermometer that was used, with its checks in ice and what is to be said of it. */
export async function drawInstruments(sheet: Sheet, { summary, state }: RecordPaper): Promise<void> {
  if (summary.instruments.length === 0) return
  const { timeZone } = summary.heading
  sheet.begin('Thermometers')
  await drawTable(sheet, [{ label: 'Name', width: 0.22 }, { label: 'Accuracy', width: 50 }, { label: 'Readings', width: 46, align: 'right' }, { label: 'Last check', width: 78 }, { label: 'Checked in ice', width: 0.4 }, { label: 'Pointed out', width: 0.38 }],
    summary.instruments.map(line => [
      line.name, accuracyWords(line.accuracyC, state.snapshot.site.temperatureUnit), String(line.readings), line.lastOn === null ? 'never' : dayWords(line.lastOn),
      line.checks.map(check => `${clockWords(isoTime(check.at), timeZone, true)} ${temperatureWords(check.value, check.unit)}, ${check.within ? 'reads the ice point' : 'out of tolerance'} (No. ${check.mark.seq})`).join('; '),
      doubtWords(line)?.slice(line.name.length + 2) ?? 'nothing',
    ]))
}
