import { clockWords, countWords, durationWords, listWords, minuteWords, numberWords } from '../../shared/charts/words'
import { isoTime } from '../../shared/record/entry'
import { acceptedWords } from '../../shared/record/margin'
import { assumptionWords, measureWords } from '../../shared/record/measures'
import type { CheckLine } from '../../shared/record/record-lines'
import { caseName, nameOf, pointName } from '../../shared/record/select'
import type { Mark } from '../../shared/record/state'
import { fullStampWords, stampWords } from '../../shared/record/summary-words'
import { handWords } from '../../shared/schemas/point-kinds'
import type { RecordPaper } from './record'
import type { Sheet } from './sheet'
import { drawTable } from './table'

/** The plan: its times, the steps of the work, the points in their order, the cases. */
export async function drawPlan(sheet: Sheet, { state, summary }: RecordPaper): Promise<void> {
  const { plan } = state
  const { timeZone } = summary.heading
  const clock = (mark: Mark | null | undefined) => mark ? clockWords(isoTime(mark.at), timeZone, true) : ''
  sheet.begin('Plan')
  const { duration } = plan
  const facts = [
    `${state.planned ? `Work: ${plan.workKind.name}` : 'Unplanned outage'}${state.cause ? `; cause: ${state.cause.replace(/\.$/, '')}` : ''}.`,
    plan.startsAt ? `Start planned for ${fullStampWords(Date.parse(plan.startsAt), timeZone)}.` : '',
    duration.darkMean > 0 ? `Without control: ${minuteWords(duration.darkMean)} likely, over by ${minuteWords(duration.dark19in20)} 19 times in 20; turning back takes up to ${minuteWords(duration.rollBack19in20)}. These are estimates.` : '',
    state.approved ? `Approved by ${nameOf(state, state.approved.by)}, ${fullStampWords(state.approved.at, timeZone)}.` : state.planned ? 'Not approved.' : '',
    plan.measures.length > 0 ? `Measures: ${plan.measures.map(measure => measureWords(measure, state.snapshot.cases)).join('; ')}.` : '',
    state.marginAccepted ? `${nameOf(state, state.marginAccepted.mark.by)} accepted ${acceptedWords(state.marginAccepted)}, ${fullStampWords(state.marginAccepted.mark.at, timeZone)}: ${state.marginAccepted.reason}` : '',
    plan.assumptions.length > 0 ? `Assumed otherwise than proposed: ${plan.assumptions.map(item => assumptionWords(item, state.snapshot)).join('; ')}.` : '',
    plan.census.length > 0 ? `Found in hand before anyone began: ${plan.census.map(found => `${found.tag} (${found.words})`).join('; ')}.` : '',
    plan.note,
  ]
  sheet.paragraph(facts.filter(Boolean).join(' '))
  const steps = [...plan.steps.map(step => ({ step, name: step.name })), ...plan.rollBack.map(step => ({ step, name: `Turning back: ${step.name}` }))]
  if (steps.length > 0) {
    sheet.heading('Steps of the work')
    await drawTable(sheet, [
      { label: 'Step', width: 1 }, { label: 'Minutes', width: 78, align: 'right' }, { label: 'Without control', width: 72 }, { label: 'Begun', width: 54 }, { label: 'Done', width: 54 },
    ], steps.map(({ step, name }) => [name, `${numberWords(step.shortest)} · ${numberWords(step.likely)} · ${numberWords(step.longest)}`, step.dark ? 'yes' : 'no', clock(state.steps[step.id]?.begun), clock(state.steps[step.id]?.done)]))
    sheet.y += 3
    sheet.paragraph('Minutes: shortest · likely · longest.', { style: { size: 7.5 } })
  }
  if (plan.order.length > 0) {
    sheet.heading('Points in their order')
    const hands = new Map(plan.points.map(point => [point.tag, point]))
    await drawTable(sheet, [
      { label: '', width: 18, align: 'right' }, { label: 'Point', width: 54 }, { label: 'Name', width: 0.3 }, { label: 'Hand position', width: 66 }, { label: 'After', width: 0.28 }, { label: 'Why', width: 0.42 },
    ], plan.order.map((line, index) => {
      const planned = hands.get(line.tag)
      return [String(index + 1), line.tag, pointName(state, line.tag), planned ? handWords(planned.hand) : '', line.after.join(', '), [line.because, planned?.reason].filter(Boolean).join(' · ')]
    }))
  }
  const touched = plan.cases.filter(item => item.touched)
  const others = plan.cases.filter(item => !item.touched)
  sheet.y += 6
  sheet.paragraph(`${countWords(touched.length, 'case')} touched: ${listWords(touched.map(item => caseName(state, item.id))) || 'none'}.${others.length > 0 ? ` Not touched: ${others.map(item => `${caseName(state, item.id)}${item.reason ? ` (${item.reason})` : ''}`).join('; ')}.` : ''}`)
}

/** The times without control, each with the way in which it began. */
export async function drawDarks(sheet: Sheet, { state, summary, now }: RecordPaper): Promise<void> {
  if (state.darks.length === 0) return
  const { timeZone } = summary.heading
  sheet.begin('Without control')
  await drawTable(sheet, [{ label: 'Lost', width: 100 }, { label: 'Back', width: 100 }, { label: 'Lasted', width: 66 }, { label: 'How', width: 1 }, { label: 'By', width: 80 }], state.darks.map(dark => [
    stampWords(dark.from, timeZone), dark.to === null ? 'not yet' : stampWords(dark.to, timeZone), durationWords(((dark.to ?? now) - dark.from) / 1000),
    [dark.how === 'gate' ? 'taken away at the gate' : 'lost', dark.words, ...dark.breach].filter(Boolean).join(' · '), nameOf(state, dark.mark.by),
  ]))
  if (state.turnBackOrdered) { sheet.y += 6; sheet.paragraph(`Turning back ordered at ${stampWords(state.turnBackOrdered.mark.at, timeZone)}, ${nameOf(state, state.turnBackOrdered.mark.by)}: ${state.turnBackOrdered.reason}`) }
  if (state.turnedBack) { sheet.y += 6; sheet.paragraph(`Turned back at ${stampWords(state.turnedBack.mark.at, timeZone)}, ${nameOf(state, state.turnedBack.mark.by)}: ${state.turnedBack.reason}`) }
}

export async function drawChecks(sheet: Sheet, { state, summary }: RecordPaper): Promise<void> {
  const { timeZone } = summary.heading
  const rows = (lines: readonly CheckLine[]) => lines.map(({ ask, outcome, words, line }) => [ask, { text: outcome === 'done' ? 'done' : outcome === 'needless' ? 'not needed' : 'not signed', style: outcome === 'not signed' ? { face: 'semibold' as const } : {} }, words, line?.by ?? '', line ? clockWords(isoTime(line.at), timeZone, true) : ''])
  const columns = [{ label: 'Check', width: 0.5 }, { label: '', width: 54 }, { label: 'What was seen', width: 0.3 }, { label: 'By', width: 78 }, { label: 'Time', width: 44 }]
  sheet.begin('Checks')
  if (state.planned || state.inHandBegun) {
    sheet.heading('Before control was taken away')
    await drawTable(sheet, columns, rows(summary.checks.before))
  }
  if (state.darks.length > 0) {
    sheet.heading('On the controller, before points went back')
    await drawTable(sheet, columns, rows(summary.checks.back))
  }
}
