/** How alerts read, in lists, in the record and to whoever reviews it; the promises are this project's own. */
import { describe, expect, it } from 'vitest'
import { alertLines, openAlerts, shortList, unansweredAlerts } from '../../../shared/record/alerts'
import { told } from '../../../shared/record/words'
import { technician } from '../../support/record'
import { goOn, storyTo } from '../record/store'
import { acknowledge, look, wait } from './clock'
import { isoTime } from '../../../shared/record/entry'

describe('alerts in words', () => {
  it('of the record say who was told, who has seen it, and that it is over', () => {
    const writer = storyTo('dark')
    wait(writer, 33)
    acknowledge(writer, technician, 'overrun')
    writer.pass(3).sign(technician, 'control-back', { backAt: isoTime(writer.now) })
    look(writer)
    const { key } = writer.state.alerts.find(alert => alert.alert === 'overrun')!
    const lines = writer.entries.filter(({ entry }) => 'key' in entry.body && entry.body.key === key).map(({ entry }) => told(writer.state, entry))
    expect(lines.map(line => line.did)).toEqual(['Alert: work over its time', 'Alert passed on: work over its time', 'Alert acknowledged: work over its time', 'Alert is over: work over its time'])
    expect(lines[0]!.seen).toMatch(/^Mill Lane: the work is over its time: 26 min without control.+ · to Ada Quill$/)
    expect(lines.slice(1, 3).map(line => line.seen)).toEqual(['not acknowledged · to Ines Calloway', 'by Ada Quill'])
  })

  it('list those that nobody has seen first, the latest first', () => {
    const writer = storyTo('dark')
    wait(writer, 40)
    acknowledge(writer, technician, 'round-missed')
    const lines = alertLines(writer.state)
    expect(lines.map(line => line.alert)).toEqual(['overrun', 'unheard', 'worker-silent', 'round-late', 'round-missed'])
    expect(lines.at(-1)!.acknowledged).toEqual({ name: 'Ada Quill', at: writer.now })
    expect(unansweredAlerts(writer.state)).toHaveLength(4)
  })

  it('show none of a closed record', () => {
    const writer = storyTo('dark')
    wait(writer, 10)
    writer.sign(technician, 'control-back', { backAt: isoTime(writer.now) })
    goOn(writer, 'hand-back', 'sealed')
    expect(writer.state.alerts.some(alert => alert.over === null)).toBe(true)
    expect(openAlerts(writer.state)).toEqual([])
  })

  it('name a few and count the rest', () => {
    expect([['A'], ['A', 'B', 'C', 'D'], ['A', 'B', 'C', 'D', 'E']].map(names => shortList(names))).toEqual(['A', 'A, B, C and D', 'A, B, C and 2 more'])
  })
})
