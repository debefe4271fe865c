import { eq, sql } from 'drizzle-orm'
import type { Checkpoint } from '../../../shared/record/checkpoint'
import type { AnyEntry, Entry } from '../../../shared/record/entry'
import { frontierRoot } from '../../../shared/record/merkle'
import { asNewest } from '../../../shared/record/newest'
import type { Judgement } from '../../../shared/record/rules'
import { judge } from '../../../shared/record/rules'
import { FOLD_VERSION } from '../../../shared/record/state'
import { controllers, outages, refusals, sites } from '../../database/schema'
import type { Person } from '../access'
import { maySeeSite } from '../access'
import type { Database, Queries } from '../database'
import { notFound } from '../errors'
import { tellByMail } from '../mail/tell'
import { readDeletion } from '../retention/tombstone'
import type { PushResult, Refusal } from './admit'
import { hastenAlerts } from '../alerts/hasten'
import { admit, refuse } from './admit'
import { openingFault } from './check-opening'
import type { Draft } from './draft'
import { addEntry, addServerEntry, draftFrom, renameSigner, saveProjection } from './draft'
import { followUp } from './follow'
import type { Folds } from './folds'
import { foldsOf } from './folds'
import type { NextSigner } from './held'
import { nextSigner, unlessNeeded, withoutDatabase } from './held'
import type { Known } from './known'
import { readKnown } from './known'
import type { LockedRow } from './locked'
import { keepFold, LOCKED_COLUMNS, lockedDraft } from './locked'
import { renewCheck } from './renew-check'
import type { LogEnd } from './seen'
import { givesSeen, notThatLog } from './seen'
import { serverSigner } from './server-signer'
import { isLogAlone, storeGrown } from './store-grown'
import { surroundingsOf } from './surroundings'

/** One result an entry, and the log as it then stood: its newest checkpoint is the receipt of all that is in it. */
export interface PushAnswer { results: PushResult[], size: number, phase: string, code: string | null, checkpoint: Checkpoint | null }

/**
 * Takes signed entries into an outage's log, in order, under the lock of its row: each is verified,
 * judged and stored with the next seq, or refused with a reason. Replays are answered as the first time.
 * @param items as they came, not yet checked
 * @param now Unix ms
 * @param seen how the log stood when the device last saw it; where it does not give that, nothing is taken and all waits
 * @throws 404 when the outage, or the site that an opening names, is not the person's to see
 */
export async function appendEntries(db: Database, person: Person, outageId: string, items: unknown[], now: number, seen: LogEnd | null = null): Promise<PushAnswer> {
  const folds = foldsOf(db)
  return folds.inTurn(outageId, async () => await appendToHeld(db, folds, person, outageId, items, now, seen) ?? appendLocked(db, folds, person, outageId, items, now, seen))
}

/**
 * Decides a push upon the fold that this process holds, and stores it by one statement if nothing has changed
 * meanwhile. Null where that does not do: another process wrote, an entry is refused or was sent before, or
 * something is to be read first. Then nothing is stored.
 */
async function appendToHeld(db: Database, folds: Folds, person: Person, outageId: string, items: unknown[], now: number, seen: LogEnd | null): Promise<PushAnswer | null> {
  // Where pushes are told within one transaction, as by the seed, there is no other way to the database.
  const held = '$client' in db ? folds.take(outageId) : null
  if (held === null) return null
  const device = nextSigner(held.state, person, items)
  const began = { size: held.state.size, root: held.checkpoint.statement.root }
  const answer = device && await givesSeen(db, outageId, began, seen) && await unlessNeeded(async () => {
    const draft = draftFrom(withoutDatabase, held, await serverSigner(db), now)
    const known: Known = { devices: new Map([[device.id, { publicKey: device.publicKey, revokedAt: null }]]), answers: new Map() }
    const results = await appendAll(draft, known, person, items)
    if (results.some(result => result.status === 'refused') || !await storeHeld(db, draft, began, person, device, items)) return null
    keepFold(folds, draft)
    return answerOf(draft, results)
  })
  // Nothing was added to it: the slower way can go on from it.
  if (!answer && held.state.size === began.size) folds.keep(held)
  return answer || null
}

/**
 * Stores what was decided upon a held fold, if nothing of what it was decided upon has changed: by one statement,
 * or in a transaction of several where more is written than the log.
 */
async function storeHeld(db: Database, draft: Draft, began: LogEnd, person: Person, device: NextSigner, items: unknown[]): Promise<boolean> {
  if (isLogAlone(draft)) return storeGrown(db, draft, began, person, device)
  return db.transaction(async (tx) => {
    const row = await lockOutage(tx, draft.state.id)
    if (row?.size !== began.size || row.checkpoint?.statement.root !== began.root || !await maySeeSite(person, row.siteId, tx)) return false
    const { devices, answers } = await readKnown(tx, person.id, items)
    const known = devices.get(device.id)
    if (answers.size > 0 || known?.publicKey !== device.publicKey || known.revokedAt !== null) return false
    const locked = { ...draft, db: tx }
    await hastenAlerts(locked)
    await saveProjection(locked)
    Object.assign(draft, { rows: locked.rows, cached: locked.cached })
    return true
  })
}

async function appendLocked(db: Database, folds: Folds, person: Person, outageId: string, items: unknown[], now: number, seen: LogEnd | null): Promise<PushAnswer> {
  const { draft, results } = await db.transaction(async (tx) => {
    const signer = await serverSigner(tx)
    const row = await lockOutage(tx, outageId)
    if (row && !await maySeeSite(person, row.siteId, tx)) notFound('outage')
    if (!row && !isOpening(items[0])) notFound('outage')
    const draft = await lockedDraft(tx, folds, outageId, row, signer, now)
    if (row && !await givesSeen(tx, outageId, row.checkpoint && row.checkpoint.statement, seen)) return { draft, results: items.map(notThatLog) }
    const before = draft.state.size
    const results = await appendAll(draft, await readKnown(tx, person.id, items), person, items)
    if (draft.state.size > before) {
      await hastenAlerts(draft)
      await tellByMail(draft)
      await saveProjection(draft)
    }
    return { draft, results }
  })
  keepFold(folds, draft)
  return answerOf(draft, results)
}

/** Adds what may be added of a push, and the server's own entries that follow from it. */
async function appendAll(draft: Draft, known: Known, person: Person, items: unknown[]): Promise<PushResult[]> {
  const before = draft.state.size
  const results: PushResult[] = []
  for (const [index, item] of items.entries()) results.push(await appendOne(draft, known, person, item, `entries[${index}]`))
  if (draft.state.size > before) await followUp(draft)
  return results
}

function answerOf({ state, checkpoint }: Draft, results: PushResult[]): PushAnswer {
  return { results, size: state.size, phase: state.phase, code: state.code, checkpoint }
}

/** The outage's row without its cached fold, locked; null where it is still to be opened, and then nobody else opens it meanwhile. One that was deleted is never opened again. */
async function lockOutage(tx: Queries, id: string): Promise<LockedRow | null> {
  const find = () => tx.select(LOCKED_COLUMNS).from(outages).where(eq(outages.id, id)).for('update')
  const [row] = await find()
  if (row) return row
  await tx.execute(sql`select pg_advisory_xact_lock(hashtextextended(${id}, 0))`)
  const [opened] = await find()
  if (!opened && await readDeletion(tx, id)) notFound('outage')
  return opened ?? null
}

async function appendOne(draft: Draft, known: Known, person: Person, item: unknown, at: string): Promise<PushResult> {
  const admitted = admit(known, person, draft.state, item, at)
  if ('done' in admitted) return admitted.done
  if ('faulty' in admitted) return recordRefusal(draft, known, admitted.faulty, admitted.hash, admitted.refusal)
  const { entry, signed, signature } = admitted
  await renameSigner(draft, person, entry.device)
  const judged = judge(draft.state, entry, person, await surroundingsOf(draft.db, draft.state, entry, () => frontierRoot(draft.frontier)))
  const { standing, why } = doubted(judged, draft.state.opened === null ? null : admitted.doubt)
  // There is no log yet to keep a questioned entry in, nor one that comes before the opening.
  if (draft.state.opened === null && entry.kind !== 'outage-opened') return refuse(entry.id, 409, 'This outage is not open yet', `${at}.entry.outage`)
  if (draft.state.opened === null && standing === 'questioned') return refuse(entry.id, 422, why.join('; '), `${at}.entry.body.lostAt`)
  if (standing === 'refused') return recordRefusal(draft, known, entry, signed.hash, { id: entry.id, status: 'refused', code: 403, field: null, reason: why.join('; '), recorded: true })
  if (entry.kind === 'outage-opened' && draft.state.opened === null) {
    const fault = openingFault((asNewest(entry) as Entry<'outage-opened'>).body)
    if (fault) return refuse(entry.id, 422, fault.reason, `${at}.entry.body.${fault.field}`)
    await openOutage(draft, person, entry)
  }
  const stored = await addEntry(draft, entry, signed, signature, standing, why)
  if (entry.kind === 'instrument-checked' && standing === 'accepted') await renewCheck(draft, entry)
  if (entry.kind === 'outage-opened' && standing === 'accepted') await numberOutage(draft, entry.body.snapshot.site.id)
  const result: PushResult = { id: entry.id, status: standing, seq: stored.seq, receivedAt: stored.receivedAt, why }
  known.answers.set(entry.id, { outage: entry.outage, hash: signed.hash, result })
  return result
}

/** A doubt about the signer is a reason to question what else would be accepted. An opening has nothing to be questioned in. */
function doubted({ standing, why }: Judgement, doubt: string | null): Judgement {
  return doubt === null || standing === 'refused' ? { standing, why } : { standing: 'questioned', why: [doubt, ...why] }
}

/** The refusal leaves n, hash and reason in the log, so that the device's chain stays whole. */
async function recordRefusal(draft: Draft, known: Known, entry: AnyEntry, hash: string, refusal: Refusal): Promise<PushResult> {
  if (draft.state.opened === null) return { ...refusal, recorded: false }
  const { device, n, id } = entry
  const stored = await addServerEntry(draft, 'entry-refused', { device, n, id, hash, reason: refusal.reason.slice(0, 1000) })
  await draft.db.insert(refusals).values({ outageId: entry.outage, deviceId: device, n, id, hash, code: refusal.code, field: withinItem(refusal.field), reason: refusal.reason, seq: stored.seq })
  known.answers.set(id, { outage: entry.outage, hash, result: { ...refusal, field: withinItem(refusal.field) } })
  return refusal
}

/** A field without the item's place in this push, which another push need not share. */
function withinItem(field: string | null): string | null {
  return field?.replace(/^entries\[\d+\]\./, '') ?? null
}

async function openOutage(draft: Draft, person: Person, entry: Entry<'outage-opened'>): Promise<void> {
  const { snapshot, plan, planned } = entry.body
  const [controller] = await draft.db.select().from(controllers).where(eq(controllers.id, snapshot.controller.id))
  if (!controller || controller.siteId !== snapshot.site.id || !await maySeeSite(person, controller.siteId, draft.db)) notFound('controller')
  const opened = new Date(draft.now)
  await draft.db.insert(outages).values({
    id: entry.outage, code: entry.outage, siteId: snapshot.site.id, controllerId: snapshot.controller.id, planned, workKind: plan.workKind.name,
    phase: 'plan', state: draft.state, foldVersion: FOLD_VERSION, openedAt: opened, updatedAt: opened,
  })
}

/** Gives the outage the next number of its site. */
async function numberOutage(draft: Draft, siteId: string): Promise<void> {
  const code = await nextCode(draft.db, siteId)
  await draft.db.update(outages).set({ code }).where(eq(outages.id, draft.state.id))
  await addServerEntry(draft, 'outage-numbered', { code })
}

async function nextCode(db: Queries, siteId: string): Promise<string> {
  const [site] = await db.update(sites).set({ outageCount: sql`${sites.outageCount} + 1` }).where(eq(sites.id, siteId)).returning({ code: sites.code, count: sites.outageCount })
  return `${site!.code}-${String(site!.count).padStart(4, '0')}`
}

function isOpening(item: unknown): boolean {
  return (item as { entry?: { kind?: unknown } } | null)?.entry?.kind === 'outage-opened'
}
