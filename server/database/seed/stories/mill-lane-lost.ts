/**
 * Waiting for countersignature at Mill Lane: yesterday the controller went out unannounced. One round
 * came late, one valve could not be opened, one case went above its limit and was emptied, and the
 * end was signed on two devices.
 */
import type { CheckId } from '../../../../shared/record/checks'
import { BACK_CHECKS } from '../../../../shared/record/checks'
import { SUBMIT_STATEMENT } from '../../../../shared/record/kinds/review'
import { handBackOrder } from '../../../utils/order/for-outage'
import { proposePlan } from '../../../utils/order/propose-plan'
import { MINUTE } from '../../../utils/window/local-time'
import { draw, equipmentOf, putInHand, returnPoints, signChecks, takeRound } from '../chapters'
import type { Round } from '../chapters'
import type { Stage } from '../stage'
import { Story } from '../storyteller'
import { productCourse } from '../warming'

const HOUR = 60 * MINUTE
const STUCK = 'LV-1'
const CHECKED_IN_THE_DARK: { id: CheckId }[] = [{ id: 'store-told' }, { id: 'monitoring-told' }, { id: 'alarms-alive' }, { id: 'second-contact' }]

export async function tellMillLaneLost(stage: Stage): Promise<void> {
  const { cast: { technician2, tablet }, equipment } = stage
  const site = equipment.sites['Mill Lane']
  const lostAt = stage.now - 26 * HOUR
  const at = (minutes: number) => lostAt + minutes * MINUTE
  const story = new Story(stage.db, at(12))
  const snapshot = await equipmentOf(stage, 'Mill Lane')
  const course = productCourse(snapshot, { lostAt, backAt: at(63), slower: 1.5, slowerOf: { 'Ready meals': 1 } })
  const caseOf = (name: string) => site.cases[name]!

  await arrive()
  await inHand()
  await readyMeals()
  await handBack()
  await settle()

  async function arrive() {
    const plan = proposePlan(snapshot, { id: null, name: 'Unplanned', steps: [], rollBack: [] }, null)
    const cause = 'Screen black, all outputs off. The store rang when the dairy wall fell silent.'
    story.sign(technician2, 'outage-opened', { planned: false, lostAt: story.told(technician2, lostAt), cause, snapshot, plan })
    await story.send()
    await signChecks(story, technician2, CHECKED_IN_THE_DARK, { 'store-told': 'Piers Hallam; doors shut, no restocking', 'second-contact': 'Piers Hallam looks in every 15 minutes' }, 0.5)
    await takeRound(story, technician2, roundOf(0, 96, 171))
  }

  async function inHand() {
    const until = at(12) + 3 * HOUR
    const tags = story.state.plan.order.map(line => line.tag)
    const stuck = tags.indexOf(STUCK)
    await putInHand(story, technician2, { tags: tags.slice(0, stuck), until, minutesEach: 0.8 })
    await takeRound(story, technician2, roundOf(1, 103, 166))
    story.pass(0.9).sign(technician2, 'point-in-hand', { tag: STUCK, hand: 'open', seen: 'closed', value: null, until: story.told(technician2, until), reason: '', words: 'Stem turns, frost line does not move', photos: [] })
    await story.send()
    story.pass(1.5).sign(technician2, 'point-excused', { tag: STUCK, reason: 'Lift stem is stripped: the valve stays shut', measure: 'Both dairy cases get night covers and short rounds; ready meals are moved before their limit', photos: [] })
    await putInHand(story, technician2, { tags: tags.slice(stuck + 1), until, minutesEach: 0.8 })
    await takeRound(story, technician2, roundOf(2, 47, 214))
    story.pass(0.7).sign(technician2, 'act-signed', { caseId: caseOf('Dairy wall'), act: 'night-covers', quantity: null, words: 'Full width', photos: [] })
    await story.send()
  }

  async function readyMeals() {
    for (const [index, minutes] of [32.5, 37.8, 42.8, 47.4].entries()) await takeRound(story.goTo(at(minutes)), technician2, roundOf(3 + index, 45 - index % 2, 216 + index % 3))
    story.pass(3.2).sign(technician2, 'act-signed', { caseId: caseOf('Ready meals'), act: 'discarded', product: 'Filled rolls from the top shelf, front row', quantity: 14, unit: 'packs', place: 'Waste cage, marked', takenBy: 'Piers Hallam', left: true, words: '9 °C and more between the packs', photos: [] })
    story.pass(1.8).sign(technician2, 'act-signed', { caseId: caseOf('Ready meals'), act: 'moved', product: 'All other ready meals', quantity: 52, unit: 'trays', place: 'Cold room, left rack', words: 'With Piers Hallam and one of his people', photos: [] })
    await story.send()
    await takeRound(story.goTo(at(53.9)), technician2, roundOf(7, 43, 218))
    story.pass(1).sign(technician2, 'note-added', { words: 'Supply of the controller had failed; put in the one from the van.', photos: [] })
    story.goTo(at(58.6)).sign(technician2, 'control-back', { backAt: story.told(technician2), words: '' })
    await story.send()
  }

  async function handBack() {
    story.pass(0.5)
    const twice = story.sign(tablet, 'control-back', { backAt: story.told(tablet), words: 'Lamp on the panel is green' }, 'questioned')
    await story.pass(1.4).send()
    story.pass(0.6).sign(technician2, 'questioned-settled', { entry: twice, words: 'The tablet had no signal in the shop: the same moment, signed twice. The phone\'s time counts.' })
    await signChecks(story, technician2, BACK_CHECKS, { 'clock': 'Was four minutes behind, set', 'settings-compared': 'Against the copy of the last visit: no differences' }, 0.35)
    await takeRound(story, technician2, roundOf(8, 44, 216))
    // The stem that was tried goes back with its like: nobody knows how far it turned.
    const tags = handBackOrder(story.state).flatMap(({ tag }) => tag === 'LV-2' ? [STUCK, tag] : [tag])
    await returnPoints(story, technician2, tags, 0.55, ['K-3'])
    await takeRound(story, technician2, roundOf(9, 44, 215))
    story.pass(4).sign(technician2, 'point-proven', { tag: 'K-3', words: 'Called by the controller as the load rose: 13.9 A' })
    story.pass(0.4).sign(technician2, 'hand-back-closed', { words: '' })
    await story.send()
  }

  async function settle() {
    await takeRound(story, technician2, roundOf(10, 43, 215))
    await takeRound(story.pass(7), technician2, roundOf(11, 43, 214))
    const drawing = await draw(story, stage, technician2, 'technician2')
    story.pass(5).sign(technician2, 'submitted', { statement: SUBMIT_STATEMENT, drawing, words: 'The controller is worn out: a swap is planned. The stem of LV-1 is ordered.' })
    await story.send()
  }

  function roundOf(round: number, suction: number, discharge: number): Round {
    return { round, product: course, instrument: site.instruments['Probe 1']!, pressures: [{ group: site.suctionGroups['A medium']!, suction, discharge }] }
  }
}
