/** Last week at Quarry Street: a software update by night, from plan to seal. */
import { BACK_CHECKS, BEFORE_CHECKS } from '../../../../shared/record/checks'
import { SEAL_STATEMENT, SUBMIT_STATEMENT } from '../../../../shared/record/kinds/review'
import { logRoot } from '../../../../shared/record/merkle'
import { handBackOrder } from '../../../utils/order/for-outage'
import { proposePlan } from '../../../utils/order/propose-plan'
import { readEntries } from '../../../utils/record/log'
import { DAY, localClock, MINUTE } from '../../../utils/window/local-time'
import { draw, equipmentOf, putInHand, readPressure, returnPoints, signChecks, takeRound, tickStep } from '../chapters'
import type { Round } from '../chapters'
import type { Stage } from '../stage'
import { Story } from '../storyteller'
import { productCourse, usualCourse } from '../warming'
import { measureAt, workOf } from '../work'

const HOUR = 60 * MINUTE
/** Minutes without control: the three dark steps of the work. */
const DARK_MINUTES = 24.2

export async function tellQuarryStreetUpdate(stage: Stage): Promise<void> {
  const { cast: { technician, supervisor }, equipment } = stage
  const site = equipment.sites['Quarry Street']
  const { wallAt, momentOf } = localClock('America/Chicago')
  const midnight = Math.floor(wallAt(stage.now) / DAY) * DAY
  const begins = momentOf(midnight - 7 * DAY + 2 * HOUR + 8 * MINUTE)
  const story = new Story(stage.db, begins - 12 * HOUR)

  await plan()
  await inHand()
  const lostAt = story.now
  const course = productCourse(story.state.snapshot, { lostAt, backAt: lostAt + (DARK_MINUTES + 14) * MINUTE, slower: 1.9 })
  await dark()
  await handBack()
  await settle()
  await seal()

  async function plan() {
    const snapshot = await equipmentOf(stage, 'Quarry Street')
    const proposed = proposePlan(snapshot, workOf(equipment, 'Software update'), story.told(technician, begins))
    story.sign(technician, 'outage-opened', { planned: true, lostAt: null, cause: '', snapshot, plan: proposed })
    await story.send()
    const changed = { ...proposed, measures: [measureAt(snapshot, 'night-covers', ['Dairy wall 1–3', 'Dairy wall 4–7', 'Deli island 2'])], note: 'Doors stay shut from 02:00; the night crew stocks dry goods only.' }
    story.pass(14).sign(technician, 'plan-changed', { plan: changed, note: 'Night covers and the night crew settled with the store.' })
    await story.send()
    story.pass(3).sign(technician, 'plan-submitted', { note: 'Maker asks for this version before the summer set points.' })
    await story.send()
    story.pass(96).sign(supervisor, 'plan-approved', { note: 'Go. Call me if a case is within 15 minutes of its limit.' })
    await story.send()
  }

  async function inHand() {
    story.goTo(begins).sign(technician, 'in-hand-begun', {})
    await signChecks(story, technician, BEFORE_CHECKS, {
      'settings-saved': 'Two copies, opened both: set points of A2 and B1 read back',
      'update-file': 'Sum agrees with the sheet, ends …c41e',
      'store-told': 'Odalys Brandt, by telephone 02:10',
      'monitoring-told': 'Silence expected until 04:30',
      'no-defrost': 'A2 came out of defrost at 02:05, coils clear',
      'alarms-alive': 'Leak panel has its own supply; portable detector carried',
      'second-contact': 'Radio channel 4; duty manager calls after 20 minutes of silence',
    }, 1.1)
    await tickStep(story, technician, 'save-settings', 'done', 0.1)
    await takeRound(story, technician, roundOf(0, usualCourse(story.state.snapshot)))
    const tags = story.state.plan.order.map(line => line.tag).filter(tag => tag !== 'LT-1')
    const loose = tags.indexOf('C-5')
    const until = begins + 3 * HOUR
    await putInHand(story, technician, { tags: tags.slice(0, loose), until, minutesEach: 0.7 })
    story.pass(1.2).sign(technician, 'point-excused', { tag: 'LT-1', reason: 'Selector 2 of the bottom row turns loose on its shaft', measure: 'Case lights stay on as found; the store has its own switch for them', photos: [] })
    await putInHand(story, technician, { tags: tags.slice(loose), until, minutesEach: 0.9 })
    for (const minutes of [1, 4.5, 4.5]) pressures(1, minutes)
    await tickStep(story, technician, 'load-stage', 'begun', 0.3)
    await tickStep(story, technician, 'load-stage', 'done', 1.2)
    await takeRound(story, technician, roundOf(1, usualCourse(story.state.snapshot)))
    story.pass(0.6).sign(technician, 'went-dark', { lostAt: story.told(technician) })
    await story.send()
  }

  /** Suction holds near its target with the compressors on by hand. */
  function pressures(round: number, minutes: number) {
    story.pass(minutes)
    readPressure(story, technician, round, site.suctionGroups['A medium']!, 45, 231)
    readPressure(story, technician, round, site.suctionGroups['B low']!, 9, 228)
  }

  async function dark() {
    await tickStep(story, technician, 'update-state', 'begun', 0.2)
    await tickStep(story, technician, 'update-state', 'done', 1.3)
    await tickStep(story, technician, 'load-program', 'begun', 0.2)
    await takeRound(story.goTo(lostAt + 4.5 * MINUTE), technician, roundOf(2, course))
    const slip = { name: 'Deli service 3', typed: 53.8, reason: 'Two digits changed places while typing' }
    await takeRound(story.goTo(lostAt + 10.5 * MINUTE), technician, { ...roundOf(3, course), slip })
    await takeRound(story.goTo(lostAt + 17.5 * MINUTE), technician, roundOf(4, course))
    await tickStep(story, technician, 'load-program', 'done', 1.8)
    await tickStep(story, technician, 'restart', 'begun', 0.2)
    await tickStep(story, technician, 'restart', 'done', lostAt / MINUTE + DARK_MINUTES - story.now / MINUTE)
    story.sign(technician, 'control-back', { backAt: story.told(technician), words: 'Start screen up, outputs still masked' })
    await story.send()
  }

  async function handBack() {
    await tickStep(story, technician, 'check', 'begun', 0.1)
    await signChecks(story, technician, BACK_CHECKS, {
      'version': 'As on the approval',
      'clock': 'Ran 41 s slow after the restart, set',
      'settings-compared': 'No differences but the new version line',
      'points-list': '30 points, same tags',
    }, 0.35)
    await takeRound(story, technician, roundOf(5, course))
    const tags = handBackOrder(story.state).map(step => step.tag)
    await returnPoints(story, technician, tags.slice(0, 10), 0.45)
    await takeRound(story, technician, roundOf(6, course))
    await returnPoints(story, technician, tags.slice(10, 21), 0.45)
    await takeRound(story, technician, roundOf(7, course))
    await returnPoints(story, technician, tags.slice(21), 0.45, ['DH-B1'])
    story.pass(2).sign(technician, 'point-proven', { tag: 'DH-B1', words: 'Defrost of B1 called from the controller: 20.6 A, ended again' })
    story.pass(0.4).sign(technician, 'hand-back-closed', { words: 'Count is 0 on the sheet and on the panels' })
    await story.send()
  }

  async function settle() {
    await takeRound(story, technician, roundOf(8, course))
    await takeRound(story.pass(6), technician, roundOf(9, course))
    await tickStep(story, technician, 'check', 'done', 1)
    const drawing = await draw(story, stage, technician, 'technician')
    story.pass(3).sign(technician, 'submitted', { statement: SUBMIT_STATEMENT, drawing, words: 'Selector 2 of panel C needs a new shaft; told the store.' })
    await story.send()
  }

  async function seal() {
    story.pass(244)
    const question = story.sign(supervisor, 'question-asked', { about: null, words: 'Was the clock set before the first scheduled defrost of A3?' })
    await story.send()
    story.pass(38).sign(technician, 'question-answered', { question, words: 'Yes: set while the controller was checked, well before the defrost of A3 at 04:30.' })
    await story.send()
    const drawing = await draw(story.pass(22), stage, supervisor, 'supervisor')
    story.sign(supervisor, 'sealed', { statement: SEAL_STATEMENT, drawing, size: story.state.size, root: logRoot(await readEntries(stage.db, story.id)), words: 'Well kept.' })
    await story.send()
  }

  function roundOf(round: number, product: Round['product']): Round {
    return {
      round, product, instrument: site.instruments['Probe 1']!,
      pressures: [
        { group: site.suctionGroups['A medium']!, suction: 45 + round % 3 - 1, discharge: 231 + round % 4 },
        { group: site.suctionGroups['B low']!, suction: 9 - round % 2, discharge: 228 + round % 3 },
      ],
    }
  }
}
