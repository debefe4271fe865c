import { eq } from 'drizzle-orm'
import type { AlertLevel, AlertRules } from '../../../shared/schemas/alert-rules'
import type { SiteAlerts } from '../../../shared/schemas/alerts'
import { sites } from '../../database/schema'
import { differences } from '../changes/differences'
import type { Changer } from '../changes/keep'
import { keepChange } from '../changes/keep'
import { listChanges } from '../changes/list'
import type { Queries } from '../database'
import { withSite } from '../equipment/store'
import { unprocessable } from '../errors'
import type { Candidate } from './people'
import { alertingOf } from './people'

/** As many changes as one page tells. */
const MOST = 50

/** A site's rules of alerts, whom they may name, and who changed them. */
export async function siteAlerts(db: Queries, siteId: string): Promise<SiteAlerts> {
  const { rules, people } = await alertingOf(db, siteId)
  return { rules, people: people.map(({ id, name, role }) => ({ id, name, role })), changes: await listChanges(db, { siteId, subject: 'alerts' }, MOST) }
}

/** Sets who is told of a site's alerts; who set it and when is kept with it. 422: somebody is named who may not see the site. */
export async function setAlertRules(siteId: string, by: Changer, rules: AlertRules): Promise<AlertRules> {
  return withSite(siteId, async (tx, site) => {
    const { rules: before, people } = await alertingOf(tx, siteId)
    rules.levels.forEach(({ people: named }, index) => {
      if (named.some(id => !people.some(person => person.id === id))) unprocessable(`levels[${index}].people`, 'Somebody who stands here may not see this site, or is switched off')
    })
    await tx.update(sites).set({ alertRules: rules }).where(eq(sites.id, siteId))
    await keepChange(tx, by, { subject: 'alerts', subjectId: siteId, subjectName: site.name, siteId, deed: 'changed', fields: differences(told(before, people), told(rules, people)) })
    return rules
  })
}

/** One field a level, with people by their names as they were then. */
function told({ levels, passOnAfter }: AlertRules, people: readonly Candidate[]): Record<string, unknown> {
  const names = ({ answerable, supervisors, people: ids }: AlertLevel) => [
    ...answerable ? ['whoever has the outage'] : [],
    ...supervisors ? ['the supervisors of the site'] : [],
    ...ids.map(id => people.find(person => person.id === id)?.name ?? 'somebody who is gone').sort(),
  ]
  return { first: names(levels[0]!), second: names(levels[1]!), third: names(levels[2]!), secondAfter: passOnAfter[0], thirdAfter: passOnAfter[1] }
}
