/** Puts records under attack and gathers what was not found as it must be. */
import type { RecordDocument } from '../../../shared/record/record-document'
import { verifyRecord } from '../../../shared/record/verify'
import type { Attack } from './attacks'
import { attackOn } from './attacks'
import { checkOnce, documentOf, drawer, sealedRecord } from './records'

export const recordsToAttack = (): RecordDocument[] => [1, 2, 3, 4].map(seed => documentOf(sealedRecord(seed)))

/** The root that was sent out for the record that an attack was made on. */
export const sentRoot = (documents: readonly RecordDocument[], attack: Attack) => documents.find(document => document.outage.id === attack.document.outage.id)!.sealed!.root

/** What is wrong with the answer to an attack, or null. */
async function missed(attack: Attack, root: string): Promise<string | null> {
  const { verdict, faults, notes } = await verifyRecord(attack.document, { check: checkOnce })
  const say = (what: string) => `${attack.kind}, traces: ${attack.tidy}: ${what}; ${JSON.stringify(faults.slice(0, 2))}`
  if (attack.outcome === 'fails') {
    if (verdict !== 'fails') return say(`verdict ${verdict}`)
    return attack.seq !== null && faults[0]!.seq !== attack.seq ? say(`entry ${attack.seq} is not the one that is named`) : null
  }
  // Whole in itself: without the root it is said that it is not sealed, or that this cannot be proven.
  const alone = attack.outcome === 'not-sealed' ? verdict === 'not-sealed' : verdict === 'whole' && notes.some(note => note.includes('cannot show that'))
  if (!alone) return say(`verdict ${verdict} without the root`)
  const given = await verifyRecord(attack.document, { check: checkOnce, root })
  return given.verdict === 'another' ? null : say(`verdict ${given.verdict} with the root`)
}

/** @returns what was missed, in words, and how often each kind of attack was tried */
export async function underAttack(documents: readonly RecordDocument[], seed: number, attacks: number): Promise<{ failures: string[], counts: Record<string, number> }> {
  const draw = drawer(seed)
  const failures: string[] = []
  const counts: Record<string, number> = {}
  for (let number = 0; number < attacks; number++) {
    const attack = attackOn(documents, number, draw)
    counts[attack.kind] = (counts[attack.kind] ?? 0) + 1
    const failure = await missed(attack, sentRoot(documents, attack))
    if (failure) failures.push(`${number}: ${failure}`)
  }
  return { failures, counts }
}
