import { CAUSE_WORDS, discards } from '../../../shared/record/act-words'
import { openingOf } from '../../../shared/record/act-course'
import { alertLines } from '../../../shared/record/alerts'
import { openOffers } from '../../../shared/record/hands'
import { acceptanceWanted, marginFaults } from '../../../shared/record/margin'
import { LIVE_PHASES } from '../../../shared/record/phases'
import { caseName, firstDarkAt, nameOf, pointsInHand, pointsWaiting, proofsDue, roundsTaken, turnBackOrder, turningBack, watchedCases } from '../../../shared/record/select'
import type { OutageState } from '../../../shared/record/state'
import { openVoices, voiceDue } from '../../../shared/record/voice'
import type { WatchCase, WatchOutage } from '../../../shared/schemas/watch'
import type { CaseForecast } from '../hold/for-outage'
import { forecastCases } from '../hold/for-outage'
import { marginAt } from '../hold/margin'
import { latestTurnBack } from '../hold/turn-back'

const MINUTE = 60_000

/**
 * An outage as the watch shows it, by the fold and the engines that the run uses. Moments are absolute, so that
 * it stays true until the next entry; what counts down is worked out where it is shown.
 * @param now Unix ms
 */
export function watchSummary(state: OutageState, now: number): WatchOutage {
  const { snapshot, plan } = state
  const live = LIVE_PHASES.includes(state.phase)
  const forecasts = live ? forecastCases(state, now) : []
  const dark = state.darks.at(-1) ?? null
  const deadline = state.phase === 'dark' ? latestTurnBack(state, forecasts, now) : null
  return {
    id: state.id, code: state.code, seq: state.size, phase: state.phase, planned: state.planned,
    site: { id: snapshot.site.id, name: snapshot.site.name, timeZone: snapshot.site.timeZone },
    controller: snapshot.controller.name,
    workKind: plan.workKind.name,
    intervalMinutes: snapshot.site.intervalMinutes,
    startsAt: plan.startsAt === null ? null : Date.parse(plan.startsAt),
    inHandAt: state.inHandBegun?.at ?? null,
    dark: dark && { from: dark.from, to: dark.to },
    firstDarkAt: firstDarkAt(state),
    endedAt: state.submitted?.mark.at ?? null,
    plannedEndAt: dark && state.planned && plan.duration.dark19in20 > 0 ? dark.from + plan.duration.dark19in20 * MINUTE : null,
    rounds: roundsTaken(state).map(round => round.to),
    cases: forecasts.map(forecast => watchCase(state, forecast, now)),
    deadline: deadline && { at: Math.round(deadline.deadline), name: caseName(state, deadline.caseId), byRulebook: deadline.byRulebook, turnBackAt: Math.round(deadline.at) },
    turnBack: turningBack(state) ? 'begun' : turnBackOrder(state) ? 'ordered' : null,
    pointsInHand: pointsInHand(state).length,
    pointsWaiting: state.phase === 'in-hand' || state.phase === 'dark' ? pointsWaiting(state).length : 0,
    proofsDue: proofsDue(state).length,
    firstUntil: earliest(pointsInHand(state).map(point => point.until)),
    acts: watchedCases(state).flatMap((item) => {
      const opening = openingOf(item)
      return opening ? [{ caseId: item.id, name: caseName(state, item.id), words: CAUSE_WORDS[opening.cause], deadline: opening.deadline }] : []
    }),
    alerts: alertLines(state),
    plant: live ? state.plant.map(warning => warning.words) : [],
    questioned: state.questioned.filter(item => item.settled === null).length,
    questions: state.questions.filter(item => item.answer === null).length,
    discarded: new Set(discards(state).map(discard => discard.caseId)).size,
    phones: phonesOf(state),
    voices: openVoices(state).map(voice => ({ supervisor: voice.supervisor, dueAt: voiceDue(voice) })),
    offers: openOffers(state).map(offer => ({ to: offer.to, fromName: nameOf(state, offer.from) })),
    planSubmitted: state.planSubmitted !== null,
    margin: marginTold(state, now),
    authors: state.authors,
    submitters: state.submitters,
  }
}

function watchCase(state: OutageState, { caseId, toward, holdMinutes, dueAt }: CaseForecast, now: number): WatchCase {
  return {
    id: caseId,
    name: caseName(state, caseId),
    limitAt: toward === 'limit' && holdMinutes !== null ? Math.round(now + holdMinutes * MINUTE) : null,
    dueAt: state.phase === 'dark' ? Math.round(dueAt) : null,
    verdict: state.cases[caseId]?.verdict?.verdict ?? null,
  }
}

/** Devices of people who have signed here, the longest unheard first. */
function phonesOf({ heard, signers }: OutageState): WatchOutage['phones'] {
  return Object.entries(heard)
    .flatMap(([device, { at, until }]) => {
      const signer = signers[device]
      return signer && signer.role !== 'server' ? [{ device, name: signer.name, role: signer.role, deviceName: signer.deviceName, at, until }] : []
    })
    .sort((a, b) => a.at - b.at || a.device.localeCompare(b.device))
}

/** The margin while it still decides something; its numbers are those of the moment. */
function marginTold(state: OutageState, now: number): WatchOutage['margin'] {
  if (!['plan', 'approved', 'in-hand'].includes(state.phase) || (state.phase === 'plan' && state.planSubmitted === null)) return null
  const figure = marginAt(state, now)
  return figure && { minutes: figure.minutes === null ? null : Math.floor(figure.minutes), faults: marginFaults(figure), accepted: acceptanceWanted(state, figure).length === 0 }
}

function earliest(times: (number | null)[]): number | null {
  const known = times.filter((time): time is number => time !== null)
  return known.length === 0 ? null : Math.min(...known)
}
