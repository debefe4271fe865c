import { dateWords, clockWords, listWords, minuteWords } from '../charts/words'
import { handWords } from '../schemas/point-kinds'
import { assumptionName, assumptionWords, measureWords } from './measures'
import type { Plan } from './plan'
import type { Snapshot } from './snapshot'

/** What is otherwise in a plan than it was, one sentence each; empty when nothing is. */
export function planChanges(before: Plan, after: Plan, snapshot: Snapshot): string[] {
  return [...startChanges(before, after, snapshot), ...workChanges(before, after), ...pointChanges(before, after), ...caseChanges(before, after, snapshot), ...factChanges(before, after, snapshot)]
}

function startChanges(before: Plan, after: Plan, { site }: Snapshot): string[] {
  if (before.startsAt === after.startsAt) return []
  const when = (time: string | null) => time === null ? 'not set' : `${dateWords(time, site.timeZone)}, ${clockWords(time, site.timeZone)}`
  return [`Start: ${when(after.startsAt)} (was ${when(before.startsAt)})`]
}

function workChanges(before: Plan, after: Plan): string[] {
  const said: string[] = []
  if (before.workKind.name !== after.workKind.name) said.push(`Work: ${after.workKind.name} (was ${before.workKind.name})`)
  const old = new Map([...before.steps, ...before.rollBack].map(step => [step.id, step]))
  for (const step of [...after.steps, ...after.rollBack]) {
    const was = old.get(step.id)
    const minutes = (of: typeof step) => `${of.shortest}, ${of.likely}, ${of.longest} min`
    if (!was) said.push(`New step: ${step.name}`)
    else if (minutes(was) !== minutes(step)) said.push(`${step.name}: ${minutes(step)} (was ${minutes(was)})`)
    old.delete(step.id)
  }
  for (const step of old.values()) said.push(`No longer a step: ${step.name}`)
  if (before.duration.dark19in20 !== after.duration.dark19in20) said.push(`Over 19 times in 20: ${minuteWords(after.duration.dark19in20)} without control (was ${minuteWords(before.duration.dark19in20)})`)
  return said
}

function pointChanges(before: Plan, after: Plan): string[] {
  const old = new Map(before.points.map(point => [point.tag, point]))
  const said = after.points.flatMap(({ tag, hand, reason }) => {
    const was = old.get(tag)
    if (was && handWords(was.hand) === handWords(hand)) return []
    return [`${tag}: ${handWords(hand)} (was ${was ? handWords(was.hand) : 'not touched'})${reason ? `, ${reason}` : ''}`]
  })
  const now = new Set(after.points.map(point => point.tag))
  const left = before.points.filter(point => !now.has(point.tag)).map(point => point.tag)
  return left.length > 0 ? [...said, `No longer touched: ${listWords(left)}`] : said
}

function caseChanges(before: Plan, after: Plan, { cases }: Snapshot): string[] {
  const old = new Map(before.cases.map(item => [item.id, item.touched]))
  return after.cases.filter(item => (old.get(item.id) ?? false) !== item.touched)
    .map(item => `${cases.find(known => known.id === item.id)?.name ?? 'A case'}: ${item.touched ? 'touched' : 'not touched'}`)
}

function factChanges(before: Plan, after: Plan, snapshot: Snapshot): string[] {
  const measures = (plan: Plan) => plan.measures.map(measure => measureWords(measure, snapshot.cases))
  const [hadMeasures, hasMeasures] = [measures(before), measures(after)]
  const assumptions = (plan: Plan) => new Map(plan.assumptions.map(item => [`${item.about} ${item.id}`, item]))
  const [had, has] = [assumptions(before), assumptions(after)]
  const census = (plan: Plan) => new Map(plan.census.map(item => [item.tag, item.words]))
  const [found, finds] = [census(before), census(after)]
  return [
    ...hasMeasures.filter(words => !hadMeasures.includes(words)).map(words => `New measure: ${words}`),
    ...hadMeasures.filter(words => !hasMeasures.includes(words)).map(words => `No longer a measure: ${words}`),
    ...[...has].filter(([key, item]) => had.get(key)?.value !== item.value).map(([, item]) => `Assumed: ${assumptionWords(item, snapshot)}`),
    ...[...had].filter(([key]) => !has.has(key)).map(([, item]) => `Assumed as proposed again: ${assumptionName(item.about, item.id, snapshot)}`),
    ...[...finds].filter(([tag, words]) => found.get(tag) !== words).map(([tag, words]) => `Found in hand: ${tag}, ${words}`),
    ...[...found].filter(([tag]) => !finds.has(tag)).map(([tag]) => `No longer listed as found in hand: ${tag}`),
    ...before.watchDefrosts === after.watchDefrosts ? [] : [after.watchDefrosts ? 'One defrost of each kind is watched' : 'No defrost is watched'],
    ...before.note === after.note ? [] : [after.note === '' ? 'The note is gone' : `Note: ${after.note}`],
  ]
}
