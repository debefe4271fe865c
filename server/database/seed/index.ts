import { eq } from 'drizzle-orm'
import type { Storage } from 'unstorage'
import type { Database } from '../../utils/database'
import { fileStorage } from '../../utils/files/storage'
import { serverSigner } from '../../utils/record/server-signer'
import { devices, people, sites } from '../schema'
import { seedLimits } from './limits'
import { joinedAt, seedPeople } from './people'
import { seedSites } from './sites'
import { tellAbbotGreenUpdate } from './stories/abbot-green-update'
import { tellMillLaneLost } from './stories/mill-lane-lost'
import { tellMillLaneSwap } from './stories/mill-lane-swap'
import { tellQuarryStreetUpdate } from './stories/quarry-street-update'

/** Outages that the sites had before the demo begins: the next one takes the number after. */
const EARLIER_OUTAGES = { Q027: 40, Q031: 17, Q008: 6 }

/**
 * Seeds the demo once: nothing happens where anybody exists already. All or nothing: a start that is
 * killed halfway leaves the database empty, and the next one seeds again.
 * @param now Unix ms
 * @param storage where drawn signatures are kept
 * @throws Error where the rules no longer let a story go as it is told
 */
export async function seedDemo(db: Database, now: number, storage: Storage = fileStorage()): Promise<void> {
  const [somebody] = await db.select({ id: people.id }).from(people).limit(1)
  if (somebody) return
  const signer = await serverSigner(db)
  await db.transaction(async (tx) => {
    // The stories lie in the past, and nobody signs with a key that was not yet enrolled.
    signer.enrolledAt = joinedAt(now)
    await tx.update(devices).set({ enrolledAt: signer.enrolledAt }).where(eq(devices.id, signer.device))
    const equipment = await seedSites(tx, now)
    for (const [code, outageCount] of Object.entries(EARLIER_OUTAGES)) await tx.update(sites).set({ outageCount }).where(eq(sites.code, code))
    const cast = await seedPeople(tx, equipment.sites, now)
    await seedLimits(tx, equipment.sites, joinedAt(now).getTime())
    // A transaction within a transaction is a savepoint: appending needs no more than that.
    const stage = { db: tx as unknown as Database, storage, now, equipment, cast }
    await tellQuarryStreetUpdate(stage)
    await tellMillLaneLost(stage)
    await tellMillLaneSwap(stage)
    await tellAbbotGreenUpdate(stage)
  })
}
