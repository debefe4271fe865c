import type { StoredEntry } from '~~/shared/record/entry'
import { happenedAt } from '~~/shared/record/entry'
import { asNewest } from '~~/shared/record/newest'
import type { Plan } from '~~/shared/record/plan'

export interface PlanVersion { seq: number, at: number, by: string, note: string, plan: Plan, /** when it was sent for approval, Unix ms; null: it never was */ sentAt: number | null }

/** Every plan that a log holds, oldest first. */
export function planVersions(entries: readonly StoredEntry[]): PlanVersion[] {
  const versions: PlanVersion[] = []
  for (const { entry: signed, seq, standing } of entries) {
    if (standing !== 'accepted') continue
    const entry = asNewest(signed)
    if (entry.kind === 'outage-opened') versions.push({ seq, at: happenedAt(entry), by: entry.by, note: '', plan: entry.body.plan, sentAt: null })
    if (entry.kind === 'plan-changed') versions.push({ seq, at: happenedAt(entry), by: entry.by, note: entry.body.note, plan: entry.body.plan, sentAt: null })
    const last = versions.at(-1)
    if (entry.kind === 'plan-submitted' && last) last.sentAt = happenedAt(entry)
  }
  return versions
}
