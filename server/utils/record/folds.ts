import type { Checkpoint } from '../../../shared/record/checkpoint'
import type { Frontier } from '../../../shared/record/merkle'
import type { OutageState } from '../../../shared/record/state'
import type { Database } from '../database'

/** The fold of an outage's whole log as this process knew it last. Whether the log still ends there, only the row can say: by size and root. */
export interface HeldFold {
  state: OutageState
  frontier: Frontier
  checkpoint: Checkpoint
  /** how many entries the cached fold in the row counts; null: it is to be written whatever has changed */
  cachedSize: number | null
}

/** How many outages a process holds the folds of; a fold takes some hundred kilobytes. */
const FOLDS_HELD = 128

/** The folds that one process holds, and who may write an outage from here at a time. */
export class Folds {
  private readonly held = new Map<string, HeldFold>()
  private readonly turns = new Map<string, Promise<unknown>>()

  /** Hands out a fold for writing: nobody else has it until it is kept again, and a write that fails leaves none behind. */
  take(outageId: string): HeldFold | null {
    const fold = this.held.get(outageId)
    this.held.delete(outageId)
    return fold ?? null
  }

  /** Keeps a fold, once what it says is stored for good. The one that was used longest ago makes room. */
  keep(fold: HeldFold): void {
    const other = this.held.get(fold.state.id)
    if (other && other.state.size > fold.state.size) return
    this.held.delete(fold.state.id)
    this.held.set(fold.state.id, fold)
    if (this.held.size > FOLDS_HELD) this.held.delete(this.held.keys().next().value!)
  }

  /** Runs one piece of work on an outage after the other, so that none waits for the row's lock with a connection in hand. */
  async inTurn<T>(outageId: string, work: () => Promise<T>): Promise<T> {
    const before = this.turns.get(outageId)
    const mine = before === undefined ? work() : before.then(work, work)
    this.turns.set(outageId, mine)
    try {
      return await mine
    } finally {
      if (this.turns.get(outageId) === mine) this.turns.delete(outageId)
    }
  }
}

const ofDatabase = new WeakMap<Database, Folds>()

/** The folds held of a database's outages. */
export function foldsOf(db: Database): Folds {
  const known = ofDatabase.get(db)
  if (known) return known
  const folds = new Folds()
  ofDatabase.set(db, folds)
  return folds
}
