import type { Measure } from '../../../shared/record/plan'
import type { Snapshot } from '../../../shared/record/snapshot'
import type { MeasureKind } from '../../../shared/schemas/plan-facts'
import { MEASURES } from '../../../shared/schemas/plan-facts'
import type { WorkKind } from '../../utils/order/propose-plan'
import type { SeededEquipment } from './sites'
import { WORK_KINDS } from './work-kinds'

/** A kind of work as a plan takes it. */
export function workOf({ workKinds }: SeededEquipment, name: (typeof WORK_KINDS)[number]['name']): WorkKind {
  const { steps, rollBack } = WORK_KINDS.find(kind => kind.name === name)!
  const copied = (list: typeof steps | typeof rollBack) => list.map(step => ({ ...step, after: [...step.after] }))
  return { id: workKinds[name], name, steps: copied(steps), rollBack: copied(rollBack) }
}

/** A measure at cases that the snapshot holds, with its usual factor. @throws Error where it holds none of that name */
export function measureAt({ cases }: Snapshot, kind: MeasureKind, names: readonly string[], words = ''): Measure {
  const caseIds = names.map((name) => {
    const known = cases.find(item => item.name === name)
    if (!known) throw new Error(`There is no case ${name}`)
    return known.id
  })
  return { kind, caseIds, factor: MEASURES[kind].factor, words }
}
