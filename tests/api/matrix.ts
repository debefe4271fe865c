/**
 * Who may do what over HTTP: a row per route file. A status is what somebody gets who sends a whole and
 * right request; where a role is let through and the request does nothing here, its answer to an empty
 * one (422, 400) shows that it got past the guards.
 */
import { PLAIN_ALERT_RULES } from '../../shared/schemas/alert-rules'
import type { World } from '../support/world'

/** Who asks, in the order of a row's statuses. */
export const ASKERS = ['anonymous', 'technician', 'stranger', 'auditor', 'supervisor', 'administrator'] as const
export type Asker = (typeof ASKERS)[number]

/** What rows are about: ids of the world's things. */
export interface Ids {
  site: string
  controller: string
  outage: string
  file: string
  /** things that a row may take away: one for each asker */
  rack: (asker: Asker) => string
  workKind: (asker: Asker) => string
  device: string
  person: string
}

export interface Row {
  route: string
  /** anonymous, technician, stranger, auditor, supervisor, administrator */
  expected: [number, number, number, number, number, number]
  path: (ids: Ids, asker: Asker) => string
  /** JSON that is sent; none for GET and DELETE */
  body?: (world: World, ids: Ids, asker: Asker) => unknown
  /** the same route with an id of nothing: 404 to everybody who may ask at all */
  unknown?: string
}

const NOTHING = '00000000-0000-4000-8000-000000000000'
const HASH = 'a'.repeat(64)

/** Anybody who is signed in. */
const ALL = (status: number): Row['expected'] => [401, status, status, status, status, status]
/** Anybody who may see the site; to the stranger it does not exist. */
const SITE = (status: number): Row['expected'] => [401, status, 404, status, status, status]
/** The administrator alone; to the stranger the site does not exist. */
const SITE_ADMIN = (status: number): Row['expected'] => [401, 403, 404, 403, 403, status]
const ADMIN = (status: number): Row['expected'] => [401, 403, 403, 403, 403, status]
/** Supervisors, auditors and administrators. */
const DESK = (status: number): Row['expected'] => [401, 403, 403, status, status, status]
const OPEN = (status: number): Row['expected'] => [status, status, status, status, status, status]

export const MATRIX: Row[] = [
  { route: 'GET /api/health', expected: OPEN(200), path: () => '/api/health' },
  { route: 'GET /api/server-keys', expected: OPEN(200), path: () => '/api/server-keys' },
  { route: 'GET /api/setup', expected: OPEN(200), path: () => '/api/setup' },
  { route: 'POST /api/setup', expected: OPEN(403), path: () => '/api/setup', body: () => ({ email: 'late@quillfeather.example', name: 'Late', password: 'a long password' }) },
  { route: 'ANY /api/auth/[...]', expected: OPEN(200), path: () => '/api/auth/session' },

  // A link that was not made here is nobody's.
  { route: 'GET /api/notices/[token]', expected: OPEN(404), path: () => '/api/notices/none.such', unknown: '/api/notices/another' },
  { route: 'POST /api/notices/[token]', expected: OPEN(404), path: () => '/api/notices/none.such', body: () => ({ name: 'Maud Finch' }), unknown: '/api/notices/another' },
  { route: 'GET /api/password-links', expected: OPEN(200), path: () => '/api/password-links' },
  { route: 'POST /api/password-links', expected: OPEN(422), path: () => '/api/password-links', body: () => ({}) },
  { route: 'GET /api/password-links/[purpose]/[token]', expected: OPEN(404), path: () => '/api/password-links/invitation/none.such', unknown: '/api/password-links/nothing/none.such' },
  { route: 'POST /api/password-links/[purpose]/[token]', expected: OPEN(404), path: () => '/api/password-links/password-reset/none.such', body: () => ({ password: 'a long password' }), unknown: '/api/password-links/nothing/none.such' },

  { route: 'GET /api/account', expected: ALL(200), path: () => '/api/account' },
  { route: 'POST /api/account/password', expected: ALL(422), path: () => '/api/account/password', body: () => ({}) },

  { route: 'GET /api/devices', expected: ALL(200), path: () => '/api/devices' },
  { route: 'PATCH /api/devices/[id]', expected: [401, 404, 404, 404, 404, 404], path: ids => `/api/devices/${ids.device}`, body: () => ({ name: 'Not mine' }), unknown: `/api/devices/${NOTHING}` },
  { route: 'POST /api/devices', expected: [401, 422, 422, 403, 422, 422], path: () => '/api/devices', body: () => ({}) },
  // Another's device: not theirs, so not there, but for an administrator. Asked last, since it is revoked then.
  { route: 'DELETE /api/devices/[id]', expected: [401, 404, 404, 404, 404, 200], path: ids => `/api/devices/${ids.device}`, unknown: `/api/devices/${NOTHING}` },

  { route: 'GET /api/people', expected: ADMIN(200), path: () => '/api/people' },
  { route: 'POST /api/people', expected: ADMIN(422), path: () => '/api/people', body: () => ({}) },
  { route: 'GET /api/people/[id]/devices', expected: ADMIN(200), path: ids => `/api/people/${ids.person}/devices`, unknown: `/api/people/${NOTHING}/devices` },
  { route: 'GET /api/people/[id]', expected: ADMIN(200), path: ids => `/api/people/${ids.person}`, unknown: `/api/people/${NOTHING}` },
  { route: 'POST /api/people/[id]/invitation', expected: ADMIN(409), path: ids => `/api/people/${ids.person}/invitation`, body: () => ({}), unknown: `/api/people/${NOTHING}/invitation` },
  { route: 'PATCH /api/people/[id]', expected: ADMIN(200), path: ids => `/api/people/${ids.person}`, body: () => ({}), unknown: `/api/people/${NOTHING}` },

  { route: 'GET /api/mails', expected: ADMIN(200), path: () => '/api/mails' },
  { route: 'GET /api/mails/settings', expected: ADMIN(200), path: () => '/api/mails/settings' },
  { route: 'POST /api/mails/[id]/retry', expected: ADMIN(404), path: () => `/api/mails/${NOTHING}/retry`, body: () => ({}), unknown: `/api/mails/${NOTHING}/retry` },
  // The demo's own, which is not there elsewhere.
  { route: 'GET /api/mailbox', expected: ADMIN(404), path: () => '/api/mailbox' },
  { route: 'GET /api/mailbox/[name]', expected: ADMIN(404), path: () => '/api/mailbox/none', unknown: '/api/mailbox/another' },

  { route: 'GET /api/sites', expected: ALL(200), path: () => '/api/sites' },
  { route: 'POST /api/sites', expected: ADMIN(422), path: () => '/api/sites', body: () => ({}) },
  { route: 'GET /api/sites/[siteId]', expected: SITE(200), path: ids => `/api/sites/${ids.site}`, unknown: `/api/sites/${NOTHING}` },
  { route: 'PATCH /api/sites/[siteId]', expected: SITE_ADMIN(200), path: ids => `/api/sites/${ids.site}`, body: () => ({}), unknown: `/api/sites/${NOTHING}` },
  { route: 'GET /api/alerts', expected: ALL(200), path: () => '/api/alerts' },
  { route: 'POST /api/outages/[id]/alerts/acknowledge', expected: [401, 404, 404, 403, 404, 404], path: ids => `/api/outages/${ids.outage}/alerts/acknowledge`, body: () => ({ key: 'overrun work 1' }), unknown: `/api/outages/${NOTHING}/alerts/acknowledge` },
  { route: 'GET /api/sites/[siteId]/alerts', expected: SITE(200), path: ids => `/api/sites/${ids.site}/alerts`, unknown: `/api/sites/${NOTHING}/alerts` },
  { route: 'PUT /api/sites/[siteId]/alerts', expected: SITE_ADMIN(200), path: ids => `/api/sites/${ids.site}/alerts`, body: () => PLAIN_ALERT_RULES, unknown: `/api/sites/${NOTHING}/alerts` },
  { route: 'GET /api/sites/[siteId]/limits', expected: SITE(200), path: ids => `/api/sites/${ids.site}/limits`, unknown: `/api/sites/${NOTHING}/limits` },
  { route: 'PUT /api/sites/[siteId]/limits', expected: SITE_ADMIN(200), path: ids => `/api/sites/${ids.site}/limits`, body: () => ({ holding: { addAccuracy: false, allowsMinus12: false, classes: [] }, instrumentCheckDays: 90 }), unknown: `/api/sites/${NOTHING}/limits` },
  { route: 'PUT /api/sites/[siteId]/retention', expected: SITE_ADMIN(422), path: ids => `/api/sites/${ids.site}/retention`, body: () => ({}), unknown: `/api/sites/${NOTHING}/retention` },
  { route: 'GET /api/sites/[siteId]/history', expected: SITE(200), path: ids => `/api/sites/${ids.site}/history`, unknown: `/api/sites/${NOTHING}/history` },
  { route: 'POST /api/sites/[siteId]/[resource]', expected: SITE_ADMIN(422), path: ids => `/api/sites/${ids.site}/racks`, body: () => ({}), unknown: `/api/sites/${NOTHING}/racks` },
  { route: 'PATCH /api/sites/[siteId]/[resource]/[id]', expected: SITE_ADMIN(200), path: (ids, asker) => `/api/sites/${ids.site}/racks/${ids.rack(asker)}`, body: () => ({}), unknown: `/api/sites/${NOTHING}/racks/${NOTHING}` },
  { route: 'DELETE /api/sites/[siteId]/[resource]/[id]', expected: SITE_ADMIN(204), path: (ids, asker) => `/api/sites/${ids.site}/racks/${ids.rack(asker)}`, unknown: `/api/sites/${NOTHING}/racks/${NOTHING}` },

  { route: 'GET /api/retention', expected: ADMIN(200), path: () => '/api/retention' },
  { route: 'PUT /api/retention', expected: ADMIN(422), path: () => '/api/retention', body: () => ({}) },
  { route: 'GET /api/retention/due', expected: ADMIN(200), path: () => '/api/retention/due' },
  { route: 'GET /api/retention/deleted', expected: ALL(200), path: () => '/api/retention/deleted' },

  { route: 'GET /api/controllers', expected: ALL(200), path: () => '/api/controllers' },
  { route: 'GET /api/controllers/[id]/snapshot', expected: SITE(200), path: ids => `/api/controllers/${ids.controller}/snapshot`, unknown: `/api/controllers/${NOTHING}/snapshot` },
  { route: 'POST /api/controllers/[id]/points/preview', expected: SITE_ADMIN(200), path: ids => `/api/controllers/${ids.controller}/points/preview`, body: () => ({ text: 'tag,kind,name\n' }), unknown: `/api/controllers/${NOTHING}/points/preview` },
  { route: 'POST /api/controllers/[id]/points/import', expected: SITE_ADMIN(422), path: ids => `/api/controllers/${ids.controller}/points/import`, body: () => ({}), unknown: `/api/controllers/${NOTHING}/points/import` },

  { route: 'GET /api/equipment', expected: [401, 200, 200, 403, 200, 403], path: () => '/api/equipment' },
  { route: 'GET /api/work-kinds', expected: ALL(200), path: () => '/api/work-kinds' },
  { route: 'POST /api/work-kinds', expected: ADMIN(422), path: () => '/api/work-kinds', body: () => ({}) },
  { route: 'PATCH /api/work-kinds/[id]', expected: ADMIN(200), path: (ids, asker) => `/api/work-kinds/${ids.workKind(asker)}`, body: () => ({}), unknown: `/api/work-kinds/${NOTHING}` },
  { route: 'DELETE /api/work-kinds/[id]', expected: ADMIN(204), path: (ids, asker) => `/api/work-kinds/${ids.workKind(asker)}`, unknown: `/api/work-kinds/${NOTHING}` },

  { route: 'GET /api/rulebooks', expected: ALL(200), path: () => '/api/rulebooks' },
  { route: 'GET /api/rulebooks/[id]', expected: ALL(200), path: () => '/api/rulebooks/us-food-code-2022', unknown: '/api/rulebooks/none-such' },
  { route: 'GET /api/rulebooks/[id]/sites', expected: ALL(200), path: () => '/api/rulebooks/us-food-code-2022/sites', unknown: '/api/rulebooks/none-such/sites' },
  { route: 'GET /api/changes', expected: ADMIN(200), path: () => '/api/changes?subject=person' },
  { route: 'GET /api/refrigerants', expected: ALL(200), path: () => '/api/refrigerants' },
  { route: 'GET /api/refrigerants/[id]/saturation', expected: ALL(200), path: () => '/api/refrigerants/R-744/saturation?celsius=-10', unknown: '/api/refrigerants/R-0/saturation?celsius=0' },
  { route: 'POST /api/holding/assess', expected: ALL(422), path: () => '/api/holding/assess', body: () => ({}) },
  ...['cover', 'duration', 'fit', 'hold', 'order', 'window'].map((engine): Row => ({ route: `POST /api/plan/${engine}`, expected: ALL(422), path: () => `/api/plan/${engine}`, body: () => ({}) })),

  // Exports are each person's own: another's does not exist.
  { route: 'GET /api/exports', expected: DESK(200), path: () => '/api/exports' },
  { route: 'POST /api/exports', expected: DESK(422), path: () => '/api/exports', body: () => ({}) },
  { route: 'DELETE /api/exports/[id]', expected: ALL(404), path: () => `/api/exports/${NOTHING}`, unknown: `/api/exports/${NOTHING}` },
  { route: 'GET /api/exports/[id]/file', expected: ALL(404), path: () => `/api/exports/${NOTHING}/file`, unknown: `/api/exports/${NOTHING}/file` },
  { route: 'GET /api/insights', expected: DESK(200), path: () => '/api/insights' },
  { route: 'GET /api/insights/[table]', expected: DESK(200), path: () => '/api/insights/work.csv', unknown: '/api/insights/none.csv' },
  { route: 'POST /api/insights/times', expected: [401, 403, 403, 403, 422, 422], path: () => '/api/insights/times', body: () => ({}) },

  { route: 'GET /api/watch', expected: ALL(200), path: () => '/api/watch' },
  { route: 'GET /api/watch/outages', expected: ALL(200), path: () => '/api/watch/outages' },
  { route: 'POST /api/watch/outages', expected: ALL(200), path: () => '/api/watch/outages', body: () => ({}) },

  { route: 'GET /api/outages', expected: ALL(200), path: () => '/api/outages' },
  { route: 'GET /api/records', expected: ALL(200), path: () => '/api/records' },
  { route: 'GET /api/records/choices', expected: ALL(200), path: () => '/api/records/choices' },
  { route: 'GET /api/outages/[id]', expected: SITE(200), path: ids => `/api/outages/${ids.outage}`, unknown: `/api/outages/${NOTHING}` },
  { route: 'GET /api/outages/[id]/entries', expected: SITE(200), path: ids => `/api/outages/${ids.outage}/entries`, unknown: `/api/outages/${NOTHING}/entries` },
  // An entry of nobody's is 422 to whoever may see the outage; who may sign what is judged entry by entry.
  { route: 'POST /api/outages/[id]/entries', expected: SITE(422), path: ids => `/api/outages/${ids.outage}/entries`, body: () => ({ entries: [{}] }), unknown: `/api/outages/${NOTHING}/entries` },
  { route: 'GET /api/outages/[id]/files', expected: SITE(200), path: ids => `/api/outages/${ids.outage}/files`, unknown: `/api/outages/${NOTHING}/files` },
  { route: 'GET /api/outages/[id]/files/[sha256]', expected: SITE(200), path: ids => `/api/outages/${ids.outage}/files/${ids.file}`, unknown: `/api/outages/${NOTHING}/files/${HASH}` },
  // Bytes that are no picture are 422 to those who may send one.
  { route: 'PUT /api/outages/[id]/files/[sha256]', expected: [401, 422, 404, 403, 422, 403], path: ids => `/api/outages/${ids.outage}/files/${HASH}`, body: () => ({}), unknown: `/api/outages/${NOTHING}/files/${HASH}` },
  { route: 'GET /api/outages/[id]/retention', expected: SITE(200), path: ids => `/api/outages/${ids.outage}/retention`, unknown: `/api/outages/${NOTHING}/retention` },
  { route: 'PUT /api/outages/[id]/hold', expected: [401, 403, 404, 403, 422, 422], path: ids => `/api/outages/${ids.outage}/hold`, body: () => ({}), unknown: `/api/outages/${NOTHING}/hold` },
  // Nothing of this outage was deleted.
  { route: 'GET /api/outages/[id]/deletion', expected: SITE(404), path: ids => `/api/outages/${ids.outage}/deletion`, unknown: `/api/outages/${NOTHING}/deletion` },
  { route: 'POST /api/outages/[id]/deletion', expected: ADMIN(422), path: ids => `/api/outages/${ids.outage}/deletion`, body: () => ({}), unknown: `/api/outages/${NOTHING}/deletion` },
  { route: 'GET /api/outages/[id]/lessons', expected: SITE(200), path: ids => `/api/outages/${ids.outage}/lessons`, unknown: `/api/outages/${NOTHING}/lessons` },
  { route: 'GET /api/outages/[id]/people', expected: SITE(200), path: ids => `/api/outages/${ids.outage}/people`, unknown: `/api/outages/${NOTHING}/people` },
  { route: 'POST /api/outages/[id]/lessons', expected: [401, 403, 404, 403, 422, 422], path: ids => `/api/outages/${ids.outage}/lessons`, body: () => ({ cases: [], steps: [] }), unknown: `/api/outages/${NOTHING}/lessons` },
  ...['pdf', 'csv', 'json'].map((kind): Row => ({ route: `GET /api/outages/[id]/record.${kind}`, expected: SITE(200), path: ids => `/api/outages/${ids.outage}/record.${kind}`, unknown: `/api/outages/${NOTHING}/record.${kind}` })),
]
