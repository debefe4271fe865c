import { isoTime } from '../../../shared/record/entry'
import { watchedCases } from '../../../shared/record/select'
import { forecastCase } from '../hold/for-outage'
import { assessCase } from '../holding/for-outage'
import type { Draft } from './draft'
import { addServerEntry } from './draft'

/** Entries of the server's own after others were added: a verdict where it changed. */
export async function followUp(draft: Draft): Promise<void> {
  const { state } = draft
  if (state.darks.length === 0 || state.phase === 'sealed' || state.phase === 'submitted') return
  for (const item of watchedCases(state)) {
    if (item.empty) continue
    const judged = assessCase(state, item.id, draft.now)
    if (!judged || judged.verdict === (item.verdict?.verdict ?? 'within')) continue
    // A case with a longer interval of its own is no news while it isn't due.
    if (judged.verdict === 'unknown' && forecastCase(state, state.snapshot.cases.find(known => known.id === item.id)!, draft.now).dueAt >= draft.now) continue
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
}
