import { darkKinds } from '~~/shared/record/kinds/dark'
import { handKinds } from '~~/shared/record/kinds/hand'
import { planKinds } from '~~/shared/record/kinds/plan'
import { reviewKinds } from '~~/shared/record/kinds/review'
import { roundKinds } from '~~/shared/record/kinds/rounds'
import { serverKinds } from '~~/shared/record/kinds/server'

/** Kinds of entries as a reader filters them; they follow the files that lay the kinds down. */
const GROUPS = {
  plan: { label: 'Plan', kinds: planKinds },
  points: { label: 'Checks and points', kinds: handKinds },
  rounds: { label: 'Rounds and acts', kinds: roundKinds },
  dark: { label: 'Control and work', kinds: darkKinds },
  review: { label: 'Corrections, questions and signatures', kinds: reviewKinds },
  server: { label: 'By Holdover itself', kinds: serverKinds },
} as const
export type EntryGroup = keyof typeof GROUPS
const IDS = Object.keys(GROUPS) as EntryGroup[]

export const ENTRY_GROUPS = IDS.map(id => ({ id, label: GROUPS[id].label }))

/** The group of a kind; null for a kind that this program does not know. */
export function groupOf(kind: string): EntryGroup | null {
  return IDS.find(id => Object.hasOwn(GROUPS[id].kinds, kind)) ?? null
}
