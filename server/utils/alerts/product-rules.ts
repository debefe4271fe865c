/** Alerts of product: a limit that comes near, a verdict that asks for an act. */
import { minuteWords } from '~~/shared/charts/words'
import { openingOf } from '~~/shared/record/act-course'
import { limitWords, SHORT_HOLD_MINUTES, siteClock } from '~~/shared/record/act-words'
import { caseName } from '~~/shared/record/select'
import type { OutageState } from '~~/shared/record/state'
import { LONG_AGAIN_MINUTES } from '../hold/act-needed'
import { MINUTE } from '../hold/evidence'
import type { CaseForecast } from '../hold/for-outage'
import type { AlertRule, AlertFinding } from './finding'
import type { AlertView } from './view'

/** A case whose verdict is worse than within is alerted by that, not by its forecast. */
const isWithin = (state: OutageState, caseId: string) => ['within', 'unknown'].includes(state.cases[caseId]?.verdict?.verdict ?? 'within')

function nearFinding({ state }: AlertView, { caseId, toward, holdMinutes }: CaseForecast): AlertFinding[] {
  const read = (state.cases[caseId]?.readings ?? []).some(reading => !reading.struck && reading.method === 'product')
  if (!read || toward !== 'limit' || holdMinutes === null || holdMinutes >= LONG_AGAIN_MINUTES || !isWithin(state, caseId)) return []
  return [{ about: caseId, since: null, begins: holdMinutes < SHORT_HOLD_MINUTES }]
}

const forecastOf = ({ forecasts }: AlertView, about: readonly string[]) => forecasts.find(item => item.caseId === about[0])
const endOf = (view: AlertView, about: readonly string[]) => {
  const minutes = forecastOf(view, about)?.holdMinutes
  return minutes == null ? null : Math.round(view.now + minutes * MINUTE)
}

export const LIMIT_NEAR: AlertRule = {
  start: 1,
  together: false,
  find: view => view.forecasts.flatMap(forecast => nearFinding(view, forecast)),
  words: (view, about) => {
    const { state } = view
    const [id = ''] = about
    const end = endOf(view, about) ?? view.now
    const when = end <= view.now ? 'may be there now' : `is forecast to be there at ${siteClock(state, end)}, in ${minuteWords(Math.floor((end - view.now) / MINUTE))} by the careful estimate`
    return `${caseName(state, id)} is near its limit of ${limitWords(state, id)}: it ${when}. Move the product, draw night covers or lay ice, and sign it.`
  },
  until: endOf,
}

function asked({ state }: AlertView, cause: 'act' | 'discard'): AlertFinding[] {
  return state.snapshot.cases.flatMap(({ id }): AlertFinding[] => {
    const opening = state.cases[id] && openingOf(state.cases[id])
    return opening?.cause === cause ? [{ about: id, since: opening.at, begins: true }] : []
  })
}

const deadlineOf = ({ state }: AlertView, about: readonly string[]) => {
  const item = state.cases[about[0] ?? '']
  return (item && openingOf(item)?.deadline) ?? null
}

/** What the rulebook says is to be done, cut where it is long. */
const actOf = ({ state }: AlertView, id: string) => (state.cases[id]?.verdict?.act ?? '').slice(0, 300).replace(/[.\s]+$/, '')

export const ACT_DUE: AlertRule = {
  start: 1,
  together: false,
  find: view => asked(view, 'act'),
  words: (view, about) => {
    const [id = ''] = about
    const deadline = deadlineOf(view, about)
    const act = actOf(view, id)
    return `${caseName(view.state, id)} needs an act now${deadline === null ? '' : `, by ${siteClock(view.state, deadline)}`}. ${act === '' ? 'Use, move or decide on the product' : act}. Sign what is done.`
  },
  until: deadlineOf,
}

export const DISCARD_DUE: AlertRule = {
  start: 2,
  together: false,
  find: view => asked(view, 'discard'),
  words: (view, [id = '']) => `product in ${caseName(view.state, id)} is to be discarded, now. Take it out of sale, tell the shop, and sign what is discarded.`,
  until: () => null,
}
