import { happenedAt } from '~~/shared/record/entry'
import { applyStored } from '~~/shared/record/fold'
import type { Surroundings } from '~~/shared/record/rules'
import { judge } from '~~/shared/record/rules'
import { watchedCases } from '~~/shared/record/select'
import type { OutageState } from '~~/shared/record/state'
import type { Role } from '~~/shared/schemas/people'
import { assessCase } from '~~/server/utils/holding/for-outage'
import type { OutboxEntry } from '~/offline/outbox-ports'

export interface StateHere {
  state: OutageState
  /** cases whose verdict was worked out on this device and is not in the record yet, by id */
  checkedHere: ReadonlySet<string>
}

/**
 * The state with what this device holds on top of the log: own entries that are not in it yet, each
 * judged as the server will, and the verdicts that follow, worked out by the same rule engine.
 * @param own entries by place, none refused; one with a receipt stands as that says
 * @param now server-corrected Unix ms, where verdicts are to follow the time too because the server cannot be heard; null: verdicts follow the entries alone
 */
export function stateHere(base: OutageState, own: readonly OutboxEntry[], person: { id: string, role: Role }, around: Surroundings, now: number | null): StateHere {
  const ahead = own.filter(kept => kept.receipt === null || kept.receipt.seq > base.size)
  const checkedHere = new Set<string>()
  if (ahead.length === 0 && now === null) return { state: base, checkedHere }
  const state = structuredClone(base)
  for (const { entry, signature, keptAt, receipt } of ahead) {
    const judged = receipt ? { standing: receipt.status, why: receipt.why } : judgedHere(state, entry, person, around)
    applyStored(state, { entry, signature, seq: state.size + 1, receivedAt: receipt?.receivedAt ?? keptAt, standing: judged.standing, why: judged.why })
    const body: Record<string, unknown> = entry.body
    if (typeof body.caseId === 'string') checkCase(state, body.caseId, happenedAt(entry), checkedHere)
  }
  const moment = Math.max(now ?? 0, ...ahead.map(kept => happenedAt(kept.entry)))
  for (const { id } of watchedCases(state)) checkCase(state, id, moment, checkedHere)
  return { state, checkedHere }
}

function judgedHere(state: OutageState, entry: OutboxEntry['entry'], person: { id: string, role: Role }, around: Surroundings): { standing: 'accepted' | 'questioned', why: string[] } {
  const { standing, why } = judge(state, entry, person, around)
  return { standing: standing === 'accepted' ? 'accepted' : 'questioned', why }
}

/** As the server does after an entry: a verdict where it changed. An unknown one is left to the server, which knows what it heard. */
function checkCase(state: OutageState, caseId: string, now: number, checkedHere: Set<string>): void {
  const item = state.cases[caseId]
  if (!item || item.empty || state.darks.length === 0) return
  const judged = assessCase(state, caseId, now)
  if (!judged || judged.verdict === 'unknown' || judged.verdict === (item.verdict?.verdict ?? 'within')) return
  item.verdict = { verdict: judged.verdict, deadline: judged.deadline === null ? null : Date.parse(judged.deadline), minutesAbove: judged.minutesAbove.careful, clause: judged.clause, source: judged.source, act: judged.act, why: judged.why, at: now, seq: state.size }
  if (judged.verdict === 'act' || judged.verdict === 'discard') item.openAct = state.size
  checkedHere.add(caseId)
}
