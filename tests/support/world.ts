/** A small world on the built server: two sites, one of them with equipment, and somebody of each role. */
import { proposePlan } from '../../server/utils/order/propose-plan'
import type { Snapshot } from '../../shared/record/snapshot'
import { isoTime } from '../../shared/record/entry'
import { uuidv7 } from '../../shared/record/uuid'
import type { Client } from './client'
import { signIn } from './client'
import { addPerson, OWN_PASSWORD, setUp } from './people'
import { Phone } from './phone'
import type { TestServer, TestServerOptions } from './server'
import { startTestServer } from './server'

const SITE = { code: 'Q101', name: 'Mill Lane', timeZone: 'America/Chicago', temperatureUnit: 'F', pressureUnit: 'psig', rulebook: 'us-food-code-2022' }
export const STEP = { id: 'load', name: 'Load', shortest: 5, likely: 10, longest: 20, dark: true, after: [] }

export const CAST = ['technician', 'second', 'supervisor', 'auditor', 'stranger', 'foreignSupervisor'] as const
export type CastName = (typeof CAST)[number]
const ROLE = { technician: 'technician', second: 'technician', supervisor: 'supervisor', auditor: 'auditor', stranger: 'technician', foreignSupervisor: 'supervisor' } as const

export interface World {
  server: TestServer
  administrator: Client
  people: Record<CastName, { id: string, client: Client }>
  site: string
  elsewhere: string
  controller: string
  snapshot: Snapshot
  /** A new device of somebody, enrolled. */
  phoneOf: (name: 'technician' | 'second' | 'supervisor' | 'stranger' | 'foreignSupervisor') => Promise<Phone>
  /** What opens an outage. @param lostAt given: an unplanned one, lost then */
  opening: (lostAt?: number) => Parameters<typeof Phone.prototype.write<'outage-opened'>>[2]
  /** Opens an outage; gives its id. */
  open: (phone: Phone, lostAt?: number) => Promise<string>
}

export async function startWorld(options: TestServerOptions = {}): Promise<World> {
  const server = await startTestServer(options)
  const administrator = await setUp(server.url)
  const make = async (path: string, body: object) => {
    const answer = await administrator.send<{ id: string }>('POST', path, body)
    if (answer.status !== 201) throw new Error(`${path}: ${answer.status} ${JSON.stringify(answer.body)}`)
    return answer.body.id
  }
  const site = await make('/api/sites', SITE)
  const elsewhere = await make('/api/sites', { ...SITE, code: 'Q102', name: 'Abbot Green' })
  const controller = await make(`/api/sites/${site}/controllers`, { name: 'Rack controller' })
  const rackId = await make(`/api/sites/${site}/racks`, { controllerId: controller, name: 'Rack A', refrigerant: 'R-448A' })
  const suctionGroupId = await make(`/api/sites/${site}/suction-groups`, { rackId, name: 'medium', stage: 'medium', targetSuctionPsig: 48, lowCutOutPsig: 20 })
  const circuitId = await make(`/api/sites/${site}/circuits`, { rackId, suctionGroupId, name: 'A1', defrostKind: 'electric' })
  for (const name of ['Dairy wall', 'Fish service']) await make(`/api/sites/${site}/cases`, { controllerId: controller, circuitId, name, kind: 'open-multideck', foodClass: 'tcs', usualC: 2 })
  const points = [
    { tag: 'C-1', kind: 'compressor', hand: 'on', suctionGroupId, guards: ['high pressure'] }, { tag: 'CF-1', kind: 'condenser-fan', hand: 'on' },
    { tag: 'DH-1', kind: 'defrost-heater', hand: 'off', circuitId }, { tag: 'EF-1', kind: 'evaporator-fan', hand: 'on', circuitId }, { tag: 'LLS-1', kind: 'liquid-line-valve', hand: 'open', circuitId },
  ]
  for (const point of points) await make(`/api/sites/${site}/points`, { controllerId: controller, rackId, name: point.kind, ...point })

  const people = {} as World['people']
  for (const name of CAST) {
    const email = `${name.toLowerCase()}@quillfeather.example`
    const { id } = await addPerson(administrator, email, ROLE[name], { siteIds: name === 'stranger' || name === 'foreignSupervisor' ? [elsewhere] : [site] })
    people[name] = { id, client: await signIn(server.url, email, OWN_PASSWORD) }
  }
  const { body: snapshot } = await people.technician.client.send<Snapshot>('GET', `/api/controllers/${controller}/snapshot`)
  const work = { id: null, name: 'software update', steps: [STEP], rollBack: [] }
  const opening: World['opening'] = lostAt => ({
    planned: lostAt === undefined, lostAt: lostAt === undefined ? null : isoTime(lostAt), cause: '', snapshot,
    plan: proposePlan(snapshot, work, lostAt === undefined ? isoTime(server.now() + 3_600_000) : null),
  })
  return {
    server, administrator, people, site, elsewhere, controller, snapshot, opening,
    phoneOf: name => new Phone(people[name].client, people[name].id, server.now).enrol(),
    async open(phone, lostAt) {
      const outage = uuidv7(server.now())
      const { status, answer } = await phone.act(outage, 'outage-opened', opening(lostAt))
      if (status !== 200) throw new Error(`The outage was not opened: ${status} ${JSON.stringify(answer)}`)
      return outage
    },
  }
}
