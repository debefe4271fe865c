import { eq } from 'drizzle-orm'
import { isoTime } from '../../../shared/record/entry'
import { NOTICE_PARTIES } from '../../../shared/record/kinds/server'
import type { NoticeParty } from '../../../shared/record/kinds/server'
import { measureWords } from '../../../shared/record/measures'
import { awayCases, windowOf } from '../../../shared/record/notices'
import type { OutageState } from '../../../shared/record/state'
import type { NoticeStanding, NoticeView } from '../../../shared/schemas/notices'
import { mails, outages } from '../../database/schema'
import type { Database, Queries } from '../database'
import { conflict, gone, notFound } from '../errors'
import { writeAsServer } from '../record/as-server'
import { addServerEntry } from '../record/draft'
import { readState } from '../record/log'
import { openLink } from './links'
import { linkSecret } from './places'

/** Which notice a link is about. 404: altered; 410: expired. @param now Unix ms */
function requireNotice(token: string, now: number): { outageId: string, mail: string, party: NoticeParty } {
  const link = openLink(linkSecret(), 'notice', token, now)
  if (!link.ok) return link.why === 'expired' ? gone('This link has expired') : notFound('notice')
  const [outageId = '', mail = '', party] = link.says
  return { outageId, mail, party: NOTICE_PARTIES.find(known => known === party) ?? 'shop' }
}

function standingOf(state: OutageState): NoticeStanding {
  if (state.phase === 'called-off') return 'called-off'
  if (state.phase === 'dark') return 'away'
  return state.backAt === null ? 'announced' : 'back'
}

/** Whether it is of use, and no trouble, to say that one has read it. */
function isOpen(state: OutageState): boolean {
  const standing = standingOf(state)
  return standing === 'announced' || standing === 'away'
}

/** The notice as its reader sees it, as the outage stands now. */
function viewOf(state: OutageState, party: NoticeParty, mail: string, name: string): NoticeView {
  const { site, controller } = state.snapshot
  const dark = state.darks.at(-1)
  const window = windowOf(state) ?? { from: dark?.from ?? state.opened?.at ?? 0, until: null }
  const notice = state.notices.find(item => item.mail === mail)
  const acknowledged = notice?.acknowledged ?? null
  return {
    party, site: site.name, controller: controller.name, code: state.code, work: state.plan.workKind.name, planned: state.planned, timeZone: site.timeZone,
    standing: standingOf(state), from: isoTime(window.from), until: window.until === null ? null : isoTime(window.until), backAt: state.backAt === null ? null : isoTime(state.backAt),
    cases: party === 'shop' ? awayCases(state) : [],
    measures: party === 'shop' ? state.plan.measures.map(item => measureWords(item, state.snapshot.cases)) : [],
    name, acknowledged: acknowledged && { name: acknowledged.name, at: isoTime(acknowledged.at) },
    open: isOpen(state) && acknowledged === null,
  }
}

async function nameIn(db: Queries, mail: string): Promise<string> {
  const [row] = await db.select({ notice: mails.notice }).from(mails).where(eq(mails.id, mail))
  return row?.notice?.name ?? ''
}

/** What a link of a notice shows. @param now Unix ms */
export async function readNotice(db: Database, token: string, now: number): Promise<NoticeView> {
  const { outageId, mail, party } = requireNotice(token, now)
  const [row] = await db.select().from(outages).where(eq(outages.id, outageId))
  return row ? viewOf(await readState(db, row), party, mail, await nameIn(db, mail)) : notFound('notice')
}

/** Says that a notice was read, under a name that its reader gives; the first to say so stands in the record. @param now Unix ms */
export async function acknowledgeNotice(db: Database, token: string, name: string, now: number): Promise<NoticeView> {
  const { outageId, mail, party } = requireNotice(token, now)
  const view = await writeAsServer(db, outageId, now, async (draft) => {
    const { state } = draft
    if (!state.notices.some(item => item.mail === mail && item.acknowledged)) {
      if (!isOpen(state)) return conflict(state.phase === 'called-off' ? 'The work is called off: there is nothing to acknowledge any more' : 'Control is back: there is nothing to acknowledge any more')
      await addServerEntry(draft, 'notice-acknowledged', { mail, party, name })
    }
    return viewOf(state, party, mail, await nameIn(draft.db, mail))
  })
  return view ?? notFound('notice')
}
