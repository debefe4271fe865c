/** Alerts of the plant, the work and its points. */
import { dayClockWords, minuteWords } from '~~/shared/charts/words'
import { siteClock } from '~~/shared/record/act-words'
import { shortList } from '~~/shared/record/alerts'
import { isoTime } from '~~/shared/record/entry'
import { caseName, nameOf, pointsInHand, turningBack } from '~~/shared/record/select'
import type { OutageState, PointState } from '~~/shared/record/state'
import { MINUTE } from '../hold/evidence'
import { latestTurnBack } from '../hold/turn-back'
import type { AlertRule } from './finding'
import type { AlertView } from './view'

/** Overrides that end so close upon each other go into one alert, ms. */
const TOGETHER_MS = 10 * MINUTE
/** The latest turn-back moves with each forecast: it must lie so far ahead again before the alert is over, ms. */
const AHEAD_AGAIN_MS = 2 * MINUTE

const aboutOf = ({ fault, about }: { fault: string, about: string }) => `${fault} ${about}`

export const PRESSURE: AlertRule = {
  start: 1,
  together: false,
  find: ({ state }) => state.plant.filter(({ fault }) => fault.startsWith('suction') || fault.startsWith('discharge')).map(warning => ({ about: aboutOf(warning), since: warning.at, begins: true })),
  words: ({ state }, about) => {
    const warning = state.plant.find(item => aboutOf(item) === about[0])
    return warning ? `${warning.words.slice(0, 280)}. ${warning.act.slice(0, 240)}` : 'pressure out of bounds. Read it again.'
  },
  until: () => null,
}

/** When the work was to be over 19 times in 20, Unix ms; null: nothing was planned, or control is there. */
const overBy = ({ state, dark }: AlertView) => dark && state.plan.duration.dark19in20 > 0 ? Math.round(dark.from + state.plan.duration.dark19in20 * MINUTE) : null

export const OVERRUN: AlertRule = {
  start: 1,
  together: false,
  find: (view) => {
    const by = overBy(view)
    return by !== null && by < view.now ? [{ about: 'work', since: by, begins: true }] : []
  },
  words: (view) => {
    const { state, now, dark, holdEnds } = view
    const gone = minuteWords(Math.floor((now - (dark?.from ?? now)) / MINUTE))
    const hold = holdEnds === null || holdEnds <= now ? '' : ` The shortest hold ends at ${siteClock(state, holdEnds)}.`
    return `the work is over its time: ${gone} without control, it was to be over in ${minuteWords(Math.ceil(state.plan.duration.dark19in20))} 19 times in 20.${hold} Decide whether to go on or to turn back.`
  },
  until: view => view.holdEnds,
}

const turnBackOf = ({ state, forecasts, now }: AlertView) => latestTurnBack(state, forecasts, now)

export const TURN_BACK_PAST: AlertRule = {
  start: 2,
  together: false,
  find: (view) => {
    // Without a way back there is no time to begin it.
    if (!view.dark || view.state.plan.rollBack.length === 0 || turningBack(view.state)) return []
    const at = turnBackOf(view)?.at
    return at !== undefined && at < view.now + AHEAD_AGAIN_MS ? [{ about: 'turn-back', since: null, begins: at < view.now }] : []
  },
  words: (view) => {
    const latest = turnBackOf(view)
    const { state } = view
    if (!latest) return 'the latest time to turn back is past. Turn back now, or move the product.'
    return `the latest time to turn back was ${siteClock(state, latest.at)}: ${caseName(state, latest.caseId)} gets worse at ${siteClock(state, latest.deadline)}, and the way back takes ${minuteWords(Math.ceil(state.plan.duration.rollBack19in20))}. Turn back now, or move the product.`
  },
  until: view => turnBackOf(view)?.deadline ?? null,
}

/** By when a point in hand must be off: the time that was signed with it, or that of an exception. Unix ms; null: none was signed. */
const offBy = (point: PointState) => point.exception?.by ?? point.until

function heldWords(state: OutageState, tags: readonly string[]): string {
  return shortList(tags.map((tag) => {
    const point = state.points[tag]
    const owner = point?.exception?.owner ?? (point?.owner ? nameOf(state, point.owner) : null)
    return owner === null ? tag : `${tag} (${owner})`
  }), 4)
}

export const OVERRIDE_PAST: AlertRule = {
  start: 1,
  together: true,
  find: ({ state, now }) => pointsInHand(state).flatMap((point) => {
    const by = offBy(point)
    return by !== null && by - TOGETHER_MS <= now ? [{ about: point.tag, since: by - TOGETHER_MS, begins: by < now }] : []
  }),
  words: ({ state }, about) => {
    const times = about.map(tag => state.points[tag]).flatMap(point => point && offBy(point) !== null ? [offBy(point)!] : [])
    const by = times.length > 0 ? ` at ${siteClock(state, Math.min(...times))}` : ''
    return `${heldWords(state, about)} ${about.length === 1 ? 'was' : 'were'} to be off by hand${by} and ${about.length === 1 ? 'is' : 'are'} still in hand. Put ${about.length === 1 ? 'it' : 'them'} back in auto, or sign a new time.`
  },
  until: () => null,
}

export const LEFT_IN_HAND: AlertRule = {
  start: 2,
  together: true,
  find: ({ state }) => {
    if (state.handBackClosed === null || (state.phase !== 'settle' && state.phase !== 'submitted')) return []
    const { at } = state.handBackClosed
    return pointsInHand(state).map(point => ({ about: point.tag, since: Math.max(at, point.mark?.at ?? at), begins: true }))
  },
  words: ({ state }, about) => {
    const times = about.map(tag => state.points[tag]?.exception?.by ?? null).filter((by): by is number => by !== null)
    const by = times.length > 0 ? `, by exception until ${dayClockWords(isoTime(Math.min(...times)), state.snapshot.site.timeZone)}` : ''
    return `left in hand at hand back: ${heldWords(state, about)}${by}. The controller does not have ${about.length === 1 ? 'it' : 'them'}: put ${about.length === 1 ? 'it' : 'them'} back in auto.`
  },
  until: ({ state }, about) => {
    const times = about.map(tag => state.points[tag]?.exception?.by ?? null).filter((by): by is number => by !== null)
    return times.length > 0 ? Math.min(...times) : null
  },
}
