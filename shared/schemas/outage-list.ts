import type { Phase } from '../record/phases'

/** An outage as lists show it; times in ISO 8601, UTC. */
export interface OutageItem {
  id: string
  code: string
  phase: Phase
  planned: boolean
  site: { id: string, code: string, name: string, timeZone: string }
  controller: { id: string, name: string }
  workKind: string
  pointsInHand: number
  size: number
  openedAt: string
  startsAt: string | null
  darkAt: string | null
  endedAt: string | null
  /** under legal hold */
  held: boolean
  planSubmitted: boolean
  /** decisions given by voice in the reader's name, not signed yet */
  voices: number
  /** decisions by voice that nobody signed within 12 hours */
  voicesLate: number
}

/** A page of outages, newest first; `next` goes on from here, null at the end. */
export interface OutagePage { items: OutageItem[], next: string | null }
