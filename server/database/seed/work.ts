import type { WorkKind } from '../../utils/order/propose-plan'
import type { SeededEquipment } from './sites'
import { WORK_KINDS } from './work-kinds'

/** A kind of work as a plan takes it. */
export function workOf({ workKinds }: SeededEquipment, name: (typeof WORK_KINDS)[number]['name']): WorkKind {
  const { steps, rollBack } = WORK_KINDS.find(kind => kind.name === name)!
  const copied = (list: typeof steps | typeof rollBack) => list.map(step => ({ ...step, after: [...step.after] }))
  return { id: workKinds[name], name, steps: copied(steps), rollBack: copied(rollBack) }
}
