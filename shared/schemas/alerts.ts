import { z } from 'zod'
import type { AlertLine } from '../record/alerts'
import type { AlertRules } from './alert-rules'
import type { ChangeItem } from './changes'
import type { Role } from './people'

export const acknowledgeSchema = z.object({ key: z.string().min(3).max(160) }).strict()

/** An open alert in a list over outages. Times in it are Unix ms. */
export interface OpenAlert extends AlertLine {
  code: string | null
  site: string
  timeZone: string
}

/** Alerts that nobody has acknowledged come first, then the latest; `more`: there are others still. */
export interface AlertList { items: OpenAlert[], more: boolean }

/** Who may be told of a site's alerts. */
export interface AlertPerson { id: string, name: string, role: Role }

/** A site's rules of alerts with everybody whom they may name, and who changed them when. */
export interface SiteAlerts { rules: AlertRules, people: AlertPerson[], changes: ChangeItem[] }
