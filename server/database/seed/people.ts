/** The invented people of the fictional Quillfeather Grocers, and the devices that they sign on. */
import { generateKeyPairSync } from 'node:crypto'
import type { Role } from '../../../shared/schemas/people'
import { uuidv7 } from '../../../shared/record/uuid'
import { publicKeyText } from '../../utils/record/keys'
import { hashPassword } from '../../utils/people/password'
import type { Queries } from '../../utils/database'
import { devices, people, siteAccess } from '../schema'
import type { SeededEquipment } from './sites'
import type { Teller } from './storyteller'

/** One password for all of them: the demo holds nothing that is anybody's. */
const PASSWORD = 'holdover-demo'
const DAY = 86_400_000

/** When the demo's people and devices came, well before its first story. @param now Unix ms */
export function joinedAt(now: number): Date {
  return new Date(now - 120 * DAY)
}

type SiteName = keyof SeededEquipment['sites']
interface PersonSeed { account: string, name: string, role: Role, sites: SiteName[], devices: { name: string, skew: number }[] }

const ALL: SiteName[] = ['Quarry Street', 'Mill Lane', 'Abbot Green']

const PEOPLE = [
  { account: 'technician', name: 'Juno Tarrant', role: 'technician', sites: ALL, devices: [{ name: 'Demo phone', skew: 0 }] },
  { account: 'technician2', name: 'Emre Halloran', role: 'technician', sites: ['Quarry Street', 'Mill Lane'], devices: [{ name: 'Demo phone', skew: 6_200 }, { name: 'Demo tablet', skew: 0 }] },
  { account: 'supervisor', name: 'Sabine Ockham', role: 'supervisor', sites: ALL, devices: [{ name: 'Demo desk', skew: 0 }] },
  { account: 'auditor', name: 'Linus Weatherby', role: 'auditor', sites: ALL, devices: [] },
  { account: 'admin', name: 'Maud Pennington', role: 'administrator', sites: [], devices: [] },
] as const satisfies readonly PersonSeed[]

/** Those who sign in the demo's stories. */
export interface Cast { technician: Teller, technician2: Teller, /** technician2's other device */ tablet: Teller, supervisor: Teller }

/**
 * Stores people, their access and their devices. The private halves of the keys live only as long as
 * the seeding: nobody can sign under them afterwards.
 * @param now Unix ms
 */
export async function seedPeople(db: Queries, sites: SeededEquipment['sites'], now: number): Promise<Cast> {
  const hashes = await Promise.all(PEOPLE.map(() => hashPassword(PASSWORD)))
  const joined = joinedAt(now)
  const rows = await db.insert(people)
    .values(PEOPLE.map(({ account, name, role }, index) => ({ email: `${account}@quillfeather.example`, name, role, passwordHash: hashes[index]!, createdAt: joined })))
    .returning()
  const personOf = (account: string) => {
    const { id, name, email, role, mustChangePassword } = rows.find(row => row.email.startsWith(`${account}@`))!
    return { id, name, email, role, mustChangePassword }
  }
  await db.insert(siteAccess).values(PEOPLE.flatMap(({ account, sites: seen }) => seen.map(site => ({ personId: personOf(account).id, siteId: sites[site].id }))))

  const enrolled = PEOPLE.flatMap(({ account, devices: own }) => own.map(({ name, skew }) => {
    const teller: Teller = { person: personOf(account), device: uuidv7(joined.getTime()), key: generateKeyPairSync('ed25519').privateKey, skew }
    return { account, name, teller }
  }))
  await db.insert(devices).values(enrolled.map(({ name, teller }) => ({ id: teller.device, personId: teller.person.id, name, publicKey: publicKeyText(teller.key), enrolledAt: joined })))
  const tellerOf = (account: string, name: string) => enrolled.find(device => device.account === account && device.name === name)!.teller
  return {
    technician: tellerOf('technician', 'Demo phone'),
    technician2: tellerOf('technician2', 'Demo phone'),
    tablet: tellerOf('technician2', 'Demo tablet'),
    supervisor: tellerOf('supervisor', 'Demo desk'),
  }
}
