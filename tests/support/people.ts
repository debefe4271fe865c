import { signIn, visitor } from './client'
import type { Client } from './client'
import type { PersonItem, Role } from '../../shared/schemas/people'

export const ADMINISTRATOR = { email: 'ada@quillfeather.example', name: 'Ada Brook', password: 'a long first password' }
const TEMPORARY = 'given by an administrator'
export const OWN_PASSWORD = 'chosen by its owner'

/** Makes the administrator of an empty server, as the first visit does, and signs them in. */
export async function setUp(url: string): Promise<Client> {
  const { status, body } = await visitor(url).send('POST', '/api/setup', ADMINISTRATOR)
  if (status !== 201) throw new Error(`The administrator was not made: ${status} ${JSON.stringify(body)}`)
  return signIn(url, ADMINISTRATOR.email, ADMINISTRATOR.password)
}

/** Makes an account and gives it a password of its own, as its owner does at the first sign-in. */
export async function addPerson(administrator: Client, email: string, role: Role, more: { name?: string, siteIds?: string[] } = {}): Promise<PersonItem> {
  const { status, body } = await administrator.send<PersonItem>('POST', '/api/people', { email, role, name: more.name ?? email.split('@')[0], password: TEMPORARY, siteIds: more.siteIds ?? [] })
  if (status !== 201) throw new Error(`${email} was not made: ${status} ${JSON.stringify(body)}`)
  const client = await signIn(administrator.url, email, TEMPORARY)
  const changed = await client.send('POST', '/api/account/password', { current: TEMPORARY, next: OWN_PASSWORD })
  if (changed.status !== 200) throw new Error(`${email} could not choose a password: ${changed.status}`)
  return body
}
