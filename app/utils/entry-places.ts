import type { OutboxEntry, Trouble } from '~/offline/outbox-ports'
import type { StoredEntry } from '~~/shared/record/entry'

/** Where a signed entry is: the five things that are said of it, always one of them. */
export type EntryPlace = 'kept' | 'sent' | 'record' | 'questioned' | 'refused'

export const PLACE_WORDS: Record<EntryPlace, string> = {
  kept: 'Kept on this phone',
  sent: 'Sent',
  record: 'In the record',
  questioned: 'In the record, questioned',
  refused: 'Refused, not in the record',
}

/** @param size how many entries of the record have been read back */
export function placeOfKept(kept: Pick<OutboxEntry, 'receipt' | 'refusal'>, size: number): EntryPlace {
  if (kept.refusal) return 'refused'
  if (!kept.receipt) return 'kept'
  // The server has given its receipt, but the record was not read back yet.
  if (kept.receipt.seq > size) return 'sent'
  return placeOfStored({ standing: kept.receipt.status })
}

export function placeOfStored({ standing }: Pick<StoredEntry, 'standing'>): EntryPlace {
  return standing === 'questioned' ? 'questioned' : 'record'
}

/** Why entries wait, and what will send them. */
export const TROUBLE_WORDS: Record<Trouble, string> = {
  'away': 'No connection. They are sent by themselves once there is one.',
  'signed-out': 'You are signed out. Sign in again and they are sent.',
  'another-signer': 'Somebody else is signed in. They wait for the person who signed them.',
  'missing': 'The server does not know this outage, or it is no longer one of your sites. They stay here; tell your supervisor.',
  'failed': 'The server failed on them. They stay here and are tried again.',
  'too-large': 'The server does not take an entry of this size. It stays here; tell your administrator.',
  'other-log': 'The log of this outage is not the one that this phone saw: nothing is sent to it. They stay here; tell your supervisor and whoever keeps the server.',
  'storage': 'The storage of this device is full, or the browser keeps nothing: what the server answers cannot be kept. They stay here and are sent again once there is room.',
  'newer': 'They are of a newer version than the server. They are sent once it is renewed.',
}
