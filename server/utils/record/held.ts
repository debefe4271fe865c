import type { OutageState } from '../../../shared/record/state'
import type { Person } from '../access'
import type { Queries } from '../database'

/** Thrown where a push that is decided without the database turns out to need it. */
class DatabaseNeeded extends Error {}

/** Stands for the database while a push is decided upon what this process holds. */
export const withoutDatabase = new Proxy({} as Queries, { get() { throw new DatabaseNeeded() } })

/** What work gives, or null where it needs the database after all, or the database says that an id or a place in a chain is taken. */
export async function unlessNeeded<T>(work: () => Promise<T | null>): Promise<T | null> {
  try {
    return await work()
  } catch (error) {
    if (error instanceof DatabaseNeeded || (error as { code?: unknown }).code === UNIQUE_VIOLATION) return null
    throw error
  }
}

const UNIQUE_VIOLATION = '23505'

export interface NextSigner { id: string, publicKey: string }

/**
 * The device that a push goes on with: all its items are by one device, which the log names as the person's under the
 * name and role that they have, and the first is the next of its chain. Null where anything is otherwise.
 * @param items as they came, not yet checked
 */
export function nextSigner(state: OutageState, person: Person, items: unknown[]): NextSigner | null {
  const [first, ...rest] = items.map(item => (item as { entry?: { device?: unknown, n?: unknown } | null } | null)?.entry)
  const id = first?.device
  if (typeof id !== 'string' || rest.some(entry => entry?.device !== id) || !Object.hasOwn(state.signers, id)) return null
  const { publicKey, ...signer } = state.signers[id]!
  const isTheirs = signer.person === person.id && signer.name === person.name && signer.role === person.role
  return isTheirs && first?.n === (state.chain[id]?.n ?? 0) + 1 ? { id, publicKey } : null
}
