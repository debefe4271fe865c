/**
 * A database as large as years of use make it, for measurements: copies of two real, signed outages, by SQL alone.
 * The copies have ids, codes, sites and times of their own; what is inside their signed entries is that of the
 * template with the outage's and the entry's id replaced, so that their signatures and chains are NOT valid, they have
 * no checkpoints, and `npm run rebuild` would bring their lists back to what the templates say.
 */
import { generateKeyPairSync } from 'node:crypto'
import { and, eq, like, notLike, sql } from 'drizzle-orm'
import { uuidv7 } from '../../../shared/record/uuid'
import type { Database, Queries } from '../../utils/database'
import { proposePlan } from '../../utils/order/propose-plan'
import { publicKeyText } from '../../utils/record/keys'
import { snapshotOf } from '../../utils/record/snapshot'
import { SEARCH_VERSION } from '../../utils/records/facts'
import { controllers, devices, outages, people, siteAccess, sites, workKinds } from '../schema'
import type { Teller } from './storyteller'
import { Story } from './storyteller'

const DAY = 86_400_000
/** Copies are spread over this time, one after another. */
const DAYS = 730
const MINUTES_APART = 50
/** More would lie in the future. */
export const LARGEST = 20_000
/** Of a hundred copies so many are of the sealed record, which is long; the others were called off. Together 50 entries each. */
const SEALED_OF_HUNDRED = 19
const MORE_SITES = 5
const MORE_PEOPLE = 6
/** Codes of copies begin so. */
const COPY = 'COPY-'
/** What stands in few copies, the same ones however many there are. */
export const NEEDLE = { word: 'quillfeatherneedle', copy: 77, tag: 'FEW-1', work: 'Rare work', outcome: 'returned', copies: 30 } as const

/**
 * Grows a database that holds the demo to so many copies; what is there already stays.
 * @param count copies in all
 * @param now Unix ms
 */
export async function seedLarge(db: Database, count: number, now: number): Promise<void> {
  if (count > LARGEST) throw new Error(`At most ${LARGEST} outages`)
  const have = await db.$count(outages, like(outages.code, `${COPY}%`))
  if (have === 0) await prepare(db, now)
  if (count > have) {
    await db.transaction(async (tx) => {
      await hurry(tx)
      await copy(tx, have + 1, count, now)
    })
  }
  // Statistics and the map of what everybody may see, which a quiet hour would bring by itself.
  for (const table of ['outages', 'outage_search', 'outage_facts']) await db.execute(sql.raw(`vacuum analyze ${table}`))
  await db.execute(sql`analyze entries`)
}

/**
 * Spares what takes long and says nothing here: a superuser need not have each row's keys looked up again, since the
 * rows come from rows that stand; long values are packed by the faster way, where this PostgreSQL has it.
 */
async function hurry(tx: Queries): Promise<void> {
  const [may] = await tx.execute<{ skip: boolean, pack: boolean }>(sql`
    select (select rolsuper from pg_roles where rolname = current_user) as skip, exists (select 1 from pg_settings where name = 'default_toast_compression' and 'lz4' = any(enumvals)) as pack`)
  if (may?.skip) await tx.execute(sql`set local session_replication_role = replica`)
  if (may?.pack) await tx.execute(sql`set local default_toast_compression = 'lz4'`)
  await tx.execute(sql`set local synchronous_commit = off`)
}

/** More sites and people, and a plan that is called off. */
async function prepare(db: Database, now: number): Promise<void> {
  const [first] = await db.select().from(controllers).innerJoin(sites, eq(sites.id, controllers.siteId)).where(eq(sites.code, 'Q027'))
  for (let number = 1; number <= MORE_SITES; number++) {
    const [site] = await db.insert(sites).values({ ...first!.sites, id: undefined, code: `Q9${String(number).padStart(2, '0')}`, name: `Copied store ${number}` }).returning()
    await db.insert(controllers).values({ ...first!.controllers, id: undefined, siteId: site!.id })
    const ofRole = number % 2 === 0 ? sql`('auditor', 'supervisor')` : sql`('auditor')`
    await db.execute(sql`insert into ${siteAccess} (person_id, site_id) select id, ${site!.id} from ${people} where role in ${ofRole}`)
  }
  const [somebody] = await db.select().from(people).where(eq(people.role, 'technician')).limit(1)
  await db.insert(people).values(Array.from({ length: MORE_PEOPLE }, (_, index) => ({ ...somebody!, id: undefined, email: `copied${index + 1}@quillfeather.example`, name: `Copied technician ${index + 1}`, disabledAt: new Date(now) })))
  await tellCalledOff(db, { ...somebody!, mustChangePassword: false }, first!.controllers.id, now)
}

/** A plan is opened and called off: the short template. */
async function tellCalledOff(db: Database, person: Teller['person'], controllerId: string, now: number): Promise<void> {
  const { privateKey } = generateKeyPairSync('ed25519')
  const teller: Teller = { person, device: uuidv7(now - 3 * DAY), key: privateKey, skew: 0 }
  await db.insert(devices).values({ id: teller.device, personId: person.id, name: 'Phone of the copies', publicKey: publicKeyText(privateKey), enrolledAt: new Date(now - 3 * DAY) })
  const snapshot = (await snapshotOf(db, controllerId))!
  const [work] = await db.select().from(workKinds).limit(1)
  const story = new Story(db, now - 2 * DAY)
  const plan = proposePlan(snapshot, work!, story.told(teller, now - DAY))
  story.sign(teller, 'outage-opened', { planned: true, lostAt: null, cause: '', snapshot, plan })
  story.pass(10).sign(teller, 'note-added', { words: 'The dairy wall is being rebuilt; the shop asks for another night.' })
  story.pass(5).sign(teller, 'called-off', { reason: 'The shop asks for another night' })
  await story.send()
}

async function copy(tx: Queries, from: number, to: number, now: number): Promise<void> {
  const template = async (phase: 'sealed' | 'called-off') => (await tx.select({ id: outages.id }).from(outages).where(and(eq(outages.phase, phase), notLike(outages.code, `${COPY}%`))).limit(1))[0]!.id
  const [sealed, calledOff] = [await template('sealed'), await template('called-off')]
  // The part of its number that decides something is taken from a hash: always the same, and nothing goes in step.
  const part = (salt: number) => sql.raw(`((hashint8(n * 64 + ${salt})::bigint & 2147483647) / 2147483648.0)`)
  await tx.execute(sql`
    create temporary table copies on commit drop as
    select n, md5('copied outage ' || n)::uuid as id, case when n * 37 % 100 < ${SEALED_OF_HUNDRED}::int then ${sealed}::uuid else ${calledOff}::uuid end as template,
      place.site_id, place.id as controller_id,
      ${new Date(now - DAYS * DAY).toISOString()}::timestamptz + make_interval(mins => n * ${MINUTES_APART}::int) as opened_at
    from generate_series(${from}::int, ${to}::int) n
    join (select c.id, c.site_id, row_number() over (order by s.code, c.id) - 1 as number, count(*) over () as of_all from ${controllers} c join ${sites} s on s.id = c.site_id) place on place.number = n % place.of_all`)
  await tx.execute(sql`
    insert into ${outages} (id, code, site_id, controller_id, planned, work_kind, phase, size, state, fold_version, frontier, points_in_hand, starts_at, dark_at, ended_at, opened_at, updated_at)
    select c.id, ${COPY} || lpad(n::text, 6, '0'), c.site_id, c.controller_id, o.planned, o.work_kind, o.phase, o.size, jsonb_set(o.state, '{id}', to_jsonb(c.id::text)), o.fold_version, o.frontier, o.points_in_hand,
      o.starts_at + (c.opened_at - o.opened_at), o.dark_at + (c.opened_at - o.opened_at), o.ended_at + (c.opened_at - o.opened_at), c.opened_at, o.updated_at + (c.opened_at - o.opened_at)
    from copies c join ${outages} o on o.id = c.template order by n`)
  // One copy after another, as entries come in life: those of one outage lie together.
  await tx.execute(sql`set local enable_hashjoin = off`)
  await tx.execute(sql`set local enable_mergejoin = off`)
  await tx.execute(sql`
    insert into entries (outage_id, seq, id, kind, person_id, device_id, n, hash, signed, signature, received_at, standing, why)
    select c.id, e.seq, own.id, e.kind, e.person_id, e.device_id, e.n, e.hash, replace(replace(e.signed, c.template::text, c.id::text), e.id::text, own.id::text), e.signature, e.received_at + (c.opened_at - o.opened_at), e.standing, e.why
    from copies c join ${outages} o on o.id = c.template cross join lateral (select * from entries where outage_id = c.template order by seq offset 0) e cross join lateral (select md5(e.id::text || c.n)::uuid as id) own`)
  await tx.execute(sql`
    insert into outage_search (outage_id, version, code, site_id, controller_id, work_kind, phase, opened_at, opened_on, ended_at, dark_seconds, hold_seconds, late_readings, outcomes, people, tags, words)
    select c.id, ${SEARCH_VERSION}::int, ${COPY} || lpad(n::text, 6, '0'), c.site_id, c.controller_id,
      case when n <= ${NEEDLE.copies}::int then ${NEEDLE.work} when ${part(1)} < 0.5 then 'Software update' when ${part(1)} < 0.75 then 'Controller swap' when ${part(1)} < 0.9 then 'Panel work' else 'Sensor work' end,
      s.phase, c.opened_at, c.opened_at::date, s.ended_at + (c.opened_at - s.opened_at),
      case when s.dark_seconds > 0 then 600 + (${part(2)} * 5400)::int else 0 end, case when s.dark_seconds > 0 then 900 + (${part(3)} * 9000)::int else s.hold_seconds end, (${part(4)} * 3)::int,
      array_remove(array[case when ${part(5)} < 0.2 then 'unplanned' end, case when ${part(6)} < 0.4 then 'act' end, case when ${part(7)} < 0.3 then 'above-limit' end, case when ${part(8)} < 0.2 then 'discard' end, case when ${part(4)} * 3 >= 0.5 then 'late-rounds' end, case when ${part(9)} < 0.2 then 'excused' end, case when n <= ${NEEDLE.copies}::int then ${NEEDLE.outcome} end], null),
      array(select id from (select id, row_number() over (order by email) - 1 as number, count(*) over () as of_all from ${people} where role = 'technician') t where t.number in (n % t.of_all, n * 7 % t.of_all)),
      s.tags || ('SPARE-' || n % 4) || case when n <= ${NEEDLE.copies}::int then array[${NEEDLE.tag}] else '{}'::text[] end,
      s.words || to_tsvector('english', 'lot ' || n % 5 || ' bolt' || n % 997 || case when n = ${NEEDLE.copy}::int then ${` ${NEEDLE.word}`} else '' end)
    from copies c join outage_search s on s.outage_id = c.template order by n`)
  await tx.execute(sql`insert into outage_facts (outage_id, version, facts) select c.id, f.version, f.facts from copies c join outage_facts f on f.outage_id = c.template order by n`)
}
