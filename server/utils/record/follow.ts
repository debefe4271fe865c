import { isoTime } from '../../../shared/record/entry'
import { watchedCases } from '../../../shared/record/select'
import type { CaseState } from '../../../shared/record/state'
import { actNeeded, holdsAgain } from '../hold/act-needed'
import { forecastCase } from '../hold/for-outage'
import { LATE_MS } from '../hold/history'
import { assessCase } from '../holding/for-outage'
import type { JudgedCase } from '../holding/for-outage'
import type { Draft } from './draft'
import { addServerEntry } from './draft'
import { plantChanges } from './plant-entries'

/** Entries of the server's own after others were added: a warning of the plant or a verdict where it changed, an act where one is needed. */
export async function followUp(draft: Draft): Promise<void> {
  const { state } = draft
  for (const body of plantChanges(state, draft.now)) await addServerEntry(draft, 'plant-warned', body)
  if (state.darks.length === 0 || state.phase === 'sealed' || state.phase === 'submitted') return
  for (const item of watchedCases(state)) {
    if (item.empty) continue
    const judged = assessCase(state, item.id, draft.now)
    if (judged) await enterVerdict(draft, item, judged)
    const again = holdsAgain(state, item.id, draft.now)
    if (again !== null) await addServerEntry(draft, 'act-lapsed', { caseId: item.id, holdMinutes: again === 'forever' ? null : again, judgedAt: isoTime(draft.now) })
    const need = actNeeded(state, item.id, draft.now, judged)
    if (need === null || need.entered || need.cause === 'act' || need.cause === 'discard') continue
    await addServerEntry(draft, 'act-opened', { caseId: item.id, cause: need.cause, deadline: need.deadline === null ? null : isoTime(need.deadline), openedAt: isoTime(draft.now) })
  }
}

async function enterVerdict(draft: Draft, item: CaseState, judged: JudgedCase): Promise<void> {
  if (judged.verdict === (item.verdict?.verdict ?? 'within')) return
  if (judged.verdict === 'unknown' && !isLate(draft, item.id)) return
  await addServerEntry(draft, 'verdict-changed', {
    caseId: item.id,
    verdict: judged.verdict,
    deadline: judged.deadline === null ? null : isoTime(Date.parse(judged.deadline)),
    minutesAbove: judged.minutesAbove.careful,
    clause: judged.clause,
    source: judged.source,
    act: judged.act,
    why: judged.why,
    judgedAt: isoTime(draft.now),
  })
}

/** A reading that is missing is news only without control, and once the case's own time for it is over. */
function isLate({ state, now }: Draft, caseId: string): boolean {
  const known = state.snapshot.cases.find(item => item.id === caseId)
  return state.phase === 'dark' && known !== undefined && forecastCase(state, known, now).dueAt + LATE_MS < now
}
