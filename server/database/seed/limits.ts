import { eq } from 'drizzle-orm'
import type { SiteHolding } from '../../../shared/schemas/equipment'
import { INSTRUMENT_CHECK_DAYS } from '../../../shared/schemas/equipment'
import { keepChange } from '../../utils/changes/keep'
import type { Queries } from '../../utils/database'
import { people, sites } from '../schema'
import type { SeededEquipment } from './sites'

const HOLDING: SiteHolding = { addAccuracy: false, allowsMinus12: false, classes: [{ foodClass: 'frozen', limit: null, minutes: 180 }] }
const CHECK_DAYS = 60

/** Abbot Green is stricter than its rulebook: the administrator said so a while ago. @param at Unix ms */
export async function seedLimits(db: Queries, { 'Abbot Green': site }: SeededEquipment['sites'], at: number): Promise<void> {
  const [administrator] = await db.select({ id: people.id, name: people.name }).from(people).where(eq(people.role, 'administrator'))
  await db.update(sites).set({ holding: HOLDING, instrumentCheckDays: CHECK_DAYS }).where(eq(sites.id, site.id))
  await keepChange(db, administrator!, {
    subject: 'limits', subjectId: site.id, subjectName: 'Abbot Green', siteId: site.id, deed: 'changed',
    fields: [{ field: 'class:frozen', before: null, after: { limit: null, minutes: 180 } }, { field: 'instrumentCheckDays', before: INSTRUMENT_CHECK_DAYS, after: CHECK_DAYS }],
  }, at)
}
