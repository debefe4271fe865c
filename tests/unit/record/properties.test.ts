/** What must hold of every sequence of entries, whatever is signed. Rules of this project, no published source. */
import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { applyStored, fold, foldLog } from '../../../shared/record/fold'
import { isServerKind, KINDS } from '../../../shared/record/kinds'
import type { EntryKind } from '../../../shared/record/kinds'
import { PHASES } from '../../../shared/record/phases'
import { pointsInHand } from '../../../shared/record/select'
import { emptyState } from '../../../shared/record/state'
import type { Happening } from './random'
import { DRAWN, go, STARTS, walks } from './random'

const RUNS = { seed: 20_260_303, numRuns: 90 }

const MOVES = ['plan to approved', 'approved to in-hand', 'in-hand to dark', 'in-hand to called-off', 'dark to hand-back', 'hand-back to settle', 'hand-back to dark', 'settle to dark', 'settle to submitted', 'submitted to settle', 'submitted to sealed']

/**
 * Which points are in a person's hands, written a second time straight from the words: what was put
 * in hand, however it came out, until it is signed back in auto; and what a questioned entry claims,
 * until somebody signed that point or dealt with that entry.
 */
class Hands {
  private readonly held = new Set<string>()
  private readonly claims = new Map<string, string>()

  follow({ entry, after, judgement: { standing } }: Pick<Happening, 'entry' | 'after' | 'judgement'>): void {
    const tag = 'tag' in entry.body ? entry.body.tag : ''
    if (standing === 'refused' || (tag && !Object.hasOwn(after.points, tag))) return
    if (standing === 'questioned') {
      if (entry.kind === 'point-in-hand') this.claims.set(entry.id, tag)
    } else if (entry.kind === 'point-in-hand' || entry.kind === 'point-in-auto') {
      if (entry.kind === 'point-in-hand') this.held.add(tag)
      else this.held.delete(tag)
      for (const [id, claimed] of this.claims) if (claimed === tag) this.claims.delete(id)
    } else if (entry.kind === 'questioned-settled') {
      this.claims.delete(entry.body.entry)
    }
  }

  get tags(): string[] {
    return [...new Set([...this.held, ...this.claims.values()])].sort()
  }
}

function handsAfter(start: number): Hands {
  const hands = new Hands()
  const state = emptyState(STARTS[start]!.state.id)
  for (const stored of STARTS[start]!.entries) {
    applyStored(state, stored)
    hands.follow({ entry: stored.entry, after: state, judgement: { standing: stored.standing, why: [] } })
  }
  return hands
}

/** Counts what the walks came by, so that no check passes for want of cases. */
const seen = { phases: new Set<string>(), accepted: new Map<string, number>(), questioned: new Map<string, number>(), refused: 0 }
const count = (counts: Map<string, number>, what: string) => counts.set(what, (counts.get(what) ?? 0) + 1)

function note({ entry, before, after, judgement }: Happening): void {
  seen.phases.add(after.phase)
  if (judgement.standing === 'refused') seen.refused++
  else count(judgement.standing === 'accepted' ? seen.accepted : seen.questioned, entry.kind)
  if (before.phase !== after.phase) count(seen.accepted, `${before.phase} to ${after.phase}`)
}

/** What no deed may do, by name. */
const NEVER: Record<string, (happening: Happening) => void> = {
  'dark is not reached by its gate with a planned point in auto that is not excused': ({ entry, before, judgement }) => {
    if (entry.kind === 'went-dark' && judgement.standing === 'accepted') expect(before.unready).toEqual([])
  },
  'the record is not submitted with a point in hand that no exception names': ({ before, after }) => {
    if (after.phase !== 'submitted' || before.phase === 'submitted') return
    expect(pointsInHand(after).filter(point => point.exception === null || point.questionedHand !== null)).toEqual([])
  },
  'nothing is accepted after the seal': ({ before, judgement }) => {
    if (before.phase === 'sealed') expect(judgement.standing).not.toBe('accepted')
  },
  'a questioned entry moves no phase, lowers no count, lifts no verdict and says why': ({ before, after, judgement }) => {
    if (judgement.standing !== 'questioned') return
    const openActs = Object.values(after.cases).map(item => item.openAct)
    const kept = after.phase === before.phase && pointsInHand(after).length >= before.inHand && openActs.join() === before.openActs.join() && judgement.why.length > 0
    if (!kept) expect({ phase: after.phase, inHand: pointsInHand(after).length, openActs, why: judgement.why }).toEqual(before)
  },
  'nobody approves or seals what they planned or submitted (I10)': ({ entry, before, judgement }) => {
    if (judgement.standing !== 'accepted') return
    if (entry.kind === 'plan-approved') expect(before.authors).not.toContain(entry.by)
    if (entry.kind === 'sealed') expect([...before.authors, ...before.submitters]).not.toContain(entry.by)
  },
}

/** Names the promise that a failed check broke. */
function keeping(promise: string, check: () => void): void {
  try {
    check()
  } catch (error) {
    throw new Error(`Broken: ${promise}`, { cause: error })
  }
}

describe('whatever is signed', () => {
  it('every promise above is kept, and no point in hand is lost from the count', () => {
    fc.assert(fc.property(walks, (walk) => {
      const hands = handsAfter(walk.start)
      go(walk, (happening) => {
        note(happening)
        for (const [promise, check] of Object.entries(NEVER)) keeping(promise, () => check(happening))
        hands.follow(happening)
        // Compared as text first: asking expect() ten thousand times takes most of the run.
        const counted = pointsInHand(happening.after).map(point => point.tag).sort()
        if (counted.join() !== hands.tags.join()) expect(counted).toEqual(hands.tags)
      })
    }), { ...RUNS, numRuns: 1000 })

    expect([...seen.phases].sort()).toEqual([...PHASES].sort())
    expect(DRAWN.filter(kind => kind !== 'outage-opened' && !seen.accepted.get(kind)), 'never accepted').toEqual([])
    expect(DRAWN.filter(kind => !seen.questioned.get(kind)), 'never questioned').toEqual([])
    expect(seen.refused).toBeGreaterThan(10)
    for (const move of MOVES) expect(seen.accepted.get(move) ?? 0, move).toBeGreaterThan(2)
    expect(seen.accepted.get('went-dark')).toBeGreaterThan(15)
    expect(seen.questioned.get('went-dark')).toBeGreaterThan(20)
  }, 60_000)

  it('every kind that people sign is drawn', () => {
    expect([...DRAWN].sort()).toEqual((Object.keys(KINDS) as EntryKind[]).filter(kind => !isServerKind(kind)).sort())
  })
})

describe('the fold', () => {
  it('is the same each time, in one part, in two, and one by one', () => {
    fc.assert(fc.property(walks, fc.nat(1000), (walk, cut) => {
      const { entries, state } = go(walk, () => {})
      const whole = foldLog(state.id, entries)
      const at = cut % (entries.length + 1)
      expect(whole).toEqual(state)
      expect(foldLog(state.id, structuredClone(entries))).toEqual(whole)
      expect(fold(entries.slice(at), foldLog(state.id, entries.slice(0, at)))).toEqual(whole)
      for (const [device, { n }] of Object.entries(whole.chain)) {
        const own = entries.filter(stored => stored.entry.device === device).map(stored => stored.entry.n)
        expect(own, 'without gaps').toEqual(Array.from({ length: n }, (_, index) => index + 1))
      }
    }), RUNS)
  }, 60_000)

  it('does not change when entries come again', () => {
    fc.assert(fc.property(walks, fc.nat(1000), (walk, cut) => {
      const { entries, state } = go(walk, () => {})
      expect(fold(entries.slice(cut % entries.length), state)).toEqual(state)
      expect(fold([...entries, ...entries], emptyState(state.id))).toEqual(state)
    }), RUNS)
  }, 60_000)
})
