/** Waiting for approval at Mill Lane: the controller that died yesterday is swapped tomorrow night. */
import { proposePlan } from '../../../utils/order/propose-plan'
import { DAY, localClock, MINUTE } from '../../../utils/window/local-time'
import { equipmentOf } from '../chapters'
import type { Stage } from '../stage'
import { Story } from '../storyteller'
import { measureAt, workOf } from '../work'

const HOUR = 60 * MINUTE

export async function tellMillLaneSwap(stage: Stage): Promise<void> {
  const { cast: { technician2 }, equipment } = stage
  const story = new Story(stage.db, stage.now - 5 * HOUR)
  const snapshot = await equipmentOf(stage, 'Mill Lane')
  const proposed = proposePlan(snapshot, workOf(equipment, 'Controller swap'), story.told(technician2, tomorrowNight(stage.now)))
  story.sign(technician2, 'outage-opened', { planned: true, lostAt: null, cause: '', snapshot, plan: proposed })
  await story.send()
  const plan = {
    ...proposed,
    census: [{ tag: 'EF-3', words: 'Relay lever found in hand on; nobody at the store knows since when' }],
    measures: [measureAt(snapshot, 'night-covers', ['Dairy wall', 'Produce wall']), measureAt(snapshot, 'product-moved', ['Ready meals'], 'into the cold room')],
    note: 'New controller is set up on the bench with the settings saved after the failure.',
  }
  story.pass(41).sign(technician2, 'plan-changed', { plan, note: 'Census walked with Piers Hallam' })
  story.pass(50).sign(technician2, 'plan-submitted', { note: 'The same part failed twice within a year: I would not wait.' })
  await story.send()
}

/** 01:00 in Thornbeck in the night that follows tomorrow. @param now Unix ms */
function tomorrowNight(now: number): number {
  const { wallAt, momentOf } = localClock('Europe/London')
  return momentOf(Math.floor(wallAt(now) / DAY) * DAY + 2 * DAY + HOUR)
}
