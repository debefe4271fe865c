/** Dark right now at Abbot Green: a software update, thirteen minutes without control, two rounds taken. */
import { BEFORE_CHECKS } from '../../../../shared/record/checks'
import { proposePlan } from '../../../utils/order/propose-plan'
import { MINUTE } from '../../../utils/window/local-time'
import { equipmentOf, putInHand, readPressure, signChecks, takeRound, tickStep } from '../chapters'
import type { Round } from '../chapters'
import type { Stage } from '../stage'
import { Story } from '../storyteller'
import { productCourse, usualCourse } from '../warming'
import { measureAt, workOf } from '../work'

const HOUR = 60 * MINUTE
const DARK_SINCE_MINUTES = 13
/** Checks, points and ten steady minutes before dark. */
const BEFORE_DARK_MINUTES = 33

export async function tellAbbotGreenUpdate(stage: Stage): Promise<void> {
  const { cast: { technician, supervisor }, equipment } = stage
  const site = equipment.sites['Abbot Green']
  const lostAt = stage.now - DARK_SINCE_MINUTES * MINUTE
  const begins = lostAt - BEFORE_DARK_MINUTES * MINUTE
  const story = new Story(stage.db, begins - 19 * HOUR)

  await plan()
  await inHand()
  await dark()

  async function plan() {
    const snapshot = await equipmentOf(stage, 'Abbot Green')
    const proposed = proposePlan(snapshot, workOf(equipment, 'Software update'), story.told(technician, begins))
    story.sign(technician, 'outage-opened', { planned: true, lostAt: null, cause: '', snapshot, plan: { ...proposed, measures: [measureAt(snapshot, 'night-covers', ['Dairy wall'])], note: 'Fish is iced before the start.' } })
    story.pass(6).sign(technician, 'plan-submitted', { note: '' })
    await story.send()
    story.pass(52).sign(supervisor, 'plan-approved', { note: 'The dairy wall is the short one: watch it.' })
    await story.send()
  }

  async function inHand() {
    story.goTo(begins).sign(technician, 'in-hand-begun', {})
    await signChecks(story, technician, BEFORE_CHECKS, {
      'settings-saved': 'Copy opened, set points of all three circuits read back',
      'store-told': 'Tamsin Wray, in person',
      'alarms-alive': 'Carbon dioxide alarm has its own supply; portable meter on the belt',
      'second-contact': 'Tamsin Wray calls after 15 minutes of silence',
    }, 0.7)
    await tickStep(story, technician, 'save-settings', 'done', 0.1)
    const usual = usualCourse(story.state.snapshot)
    await takeRound(story, technician, roundOf(0, usual))
    await putInHand(story, technician, { tags: story.state.plan.order.map(line => line.tag), until: lostAt + 2 * HOUR, minutesEach: 0.7 })
    for (const minutes of [0.6, 5, 5]) pressures(minutes)
    await tickStep(story, technician, 'load-stage', 'begun', 0.3)
    await tickStep(story, technician, 'load-stage', 'done', 1.1)
    await takeRound(story, technician, roundOf(1, usual))
    story.goTo(lostAt).sign(technician, 'went-dark', { lostAt: story.told(technician) })
    await story.send()
  }

  /** Suction holds near its target with one compressor of each stage on by hand. */
  function pressures(minutes: number) {
    story.pass(minutes)
    readPressure(story, technician, 1, site.suctionGroups['Medium stage']!, 417, 1046)
    readPressure(story, technician, 1, site.suctionGroups['Low stage']!, 195, 421)
  }

  async function dark() {
    const course = productCourse(story.state.snapshot, { lostAt, backAt: Infinity, slower: 2.4, slowerOf: { 'Dairy wall': 1.35 } })
    await tickStep(story, technician, 'update-state', 'begun', 0.2)
    await tickStep(story, technician, 'update-state', 'done', 1.7)
    await tickStep(story, technician, 'load-program', 'begun', 0.3)
    await takeRound(story.goTo(lostAt + 4.8 * MINUTE), technician, roundOf(2, course))
    story.pass(1.2).sign(technician, 'note-added', { words: 'Package at 14 %, no errors shown. Cover drawn over the dairy wall.', photos: [] })
    await story.send()
    await takeRound(story.goTo(lostAt + 10.4 * MINUTE), technician, roundOf(3, course))
  }

  function roundOf(round: number, product: Round['product']): Round {
    return {
      round, product, instrument: site.instruments['Probe 2']!,
      pressures: [
        { group: site.suctionGroups['Medium stage']!, suction: 417 + round % 2, discharge: 1046 + round * 3 },
        { group: site.suctionGroups['Low stage']!, suction: 195 - round % 2, discharge: 421 + round % 2 },
      ],
    }
  }
}
