import { ALERT_NOW } from '../../jobs/names'
import { hasten } from '../../jobs/queue'
import type { Draft } from '../record/draft'

/** Entries after which somebody may have to be told at once; all else is found by the next look. */
const TELLING: ReadonlySet<string> = new Set(['verdict-changed', 'plant-warned', 'act-opened', 'control-lost', 'hand-back-closed'])

/** Whether an added entry may bring an alert at once. */
export const isTelling = ({ kind }: { kind: string }) => TELLING.has(kind)

/** Asks for a look at alerts where an added entry may bring one, once the transaction has committed. */
export async function hastenAlerts({ db, state, rows }: Draft): Promise<void> {
  if (rows.some(isTelling)) await hasten(db, ALERT_NOW, { outage: state.id })
}
