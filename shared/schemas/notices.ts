import { z } from 'zod'
import type { NoticeParty } from '../record/kinds/server'
import { NAME_MAX } from './people'

/** How an outage stands, for somebody without an account. */
export type NoticeStanding = 'announced' | 'away' | 'back' | 'called-off'

/** A notice as its link shows it; times in ISO 8601 UTC. */
export interface NoticeView {
  party: NoticeParty
  site: string
  controller: string
  code: string | null
  work: string
  planned: boolean
  timeZone: string
  standing: NoticeStanding
  from: string
  /** null: nobody can say yet */
  until: string | null
  /** when control came back */
  backAt: string | null
  /** names of cases without refrigeration control; none for the monitoring centre */
  cases: string[]
  /** what the plan asks for besides */
  measures: string[]
  /** whom it was written to, by name; empty: unknown */
  name: string
  /** who said first that they have read it */
  acknowledged: { name: string, at: string } | null
  /** whether it can still be acknowledged */
  open: boolean
}

export const acknowledgeSchema = z.object({
  name: z.string({ required_error: 'Enter your name' }).trim().min(1, 'Enter your name').max(NAME_MAX, `At most ${NAME_MAX} characters`),
})
