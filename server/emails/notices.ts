import { countWords, listWords, minuteWords } from '../../shared/charts/words'
import { STAFF_MUST } from '../../shared/record/notices'
import type { ProductNotice } from '../../shared/record/notices'
import type { MailText } from '../utils/mail/write'
import type { Part } from './letter'
import { writeLetter } from './letter'
import type { AboutOutage } from './outage'
import { forContacts } from './outage'
import { clockBeside, momentWords, spanWords } from './when'

/** A window as people are told it; Unix ms, `until` null: nobody can say yet. */
export interface Window { from: number, until: number | null }

/** Cases that are named one by one; more are counted. */
const NAMED_CASES = 12

function casesPart(cases: readonly string[]): Part {
  const named = cases.slice(0, NAMED_CASES)
  return { head: 'Without refrigeration control', list: cases.length > named.length ? [...named, `and ${countWords(cases.length - named.length, 'more case')}`] : named }
}

/** "about 1 h 10". */
function lengthWords({ from, until }: Window): string {
  return until === null ? 'not known yet' : `about ${minuteWords((until - from) / 60_000)}`
}

/**
 * Notice to a shop that control of its refrigeration is, or will be, away.
 * @param link acknowledges without an account
 */
export function noticeToShop(about: AboutOutage, { window, cases, measures, by, cause, link }: { window: Window, cases: readonly string[], measures: readonly string[], by: string, cause: string, link: string }): MailText {
  const span = spanWords(window.from, window.until, about.zone)
  const what = about.planned ? `refrigeration control is taken away ${span}` : `refrigeration control was lost on ${momentWords(window.from, about.zone)}; ${window.until === null ? 'nobody can say yet until when' : `back by about ${clockBeside(window.until, window.from, about.zone)}`}`
  return writeLetter({
    subject: about.planned ? `${about.site}: refrigeration control away ${momentWords(window.from, about.zone)}` : `${about.site}: refrigeration control lost, doors shut now`,
    first: `${about.site}: ${what}. Doors shut, night covers down, no restocking.`,
    parts: [
      { list: STAFF_MUST, head: 'What your staff must do' },
      ...measures.length > 0 ? [{ list: measures, head: 'The plan also asks for' }] : [],
      { facts: [['What', about.planned ? about.work : cause || 'Control was lost unannounced'], ['When', span], ['How long', lengthWords(window)], ['Controller', about.controller], ['Technician', by], ...about.code ? [['Outage', about.code] as [string, string]] : []] },
      casesPart(cases),
      { say: 'The technician measures the product again and again until all is back, and Holdover writes to you when control is back, or if product must be moved or discarded.' },
      { press: 'I have read this', url: link },
      { say: 'No account is needed; you give your name.' },
    ],
    foot: forContacts(about.site),
  })
}

/** Notice to a monitoring centre: nothing will be heard of the controller. */
export function noticeToMonitoring(about: AboutOutage, { window, by, link }: { window: Window, by: string, link: string }): MailText {
  const span = spanWords(window.from, window.until, about.zone)
  return writeLetter({
    subject: `${about.site}: expect silence ${about.planned ? momentWords(window.from, about.zone) : 'now'}`,
    first: `${about.site}: expect silence from ${about.controller} ${span}. Do not call out; alarms that it would send are not sent.`,
    parts: [
      { facts: [['Site', about.site], ['Controller', about.controller], ['Silence', span], ['Why', about.planned ? about.work : 'control was lost unannounced; a technician is on site'], ['Technician', by], ...about.code ? [['Outage', about.code] as [string, string]] : []] },
      { say: 'If nothing is heard of it when this time is over and Holdover has not written that control is back, call the shop.' },
      { press: 'I have read this', url: link },
    ],
    foot: forContacts(about.site),
  })
}

/** What was announced does not happen: to shop and monitoring centre. */
export function calledOff(about: AboutOutage, { at, reason }: { at: number, reason: string }): MailText {
  return writeLetter({
    subject: `${about.site}: called off, control stays on`,
    first: `${about.site}: “${about.work}” is called off since ${momentWords(at, about.zone)}. Refrigeration control stays on; go on as usual.`,
    parts: [{ facts: [['Controller', about.controller], ['Reason', reason], ...about.code ? [['Outage', about.code] as [string, string]] : []] }],
    foot: forContacts(about.site),
  })
}

/** Control is back: to shop and monitoring centre. */
export function controlBack(about: AboutOutage, { party, at, from }: { party: 'shop' | 'monitoring', at: number, from: number }): MailText {
  const todo = party === 'shop' ? 'Keep night covers down where the technician asks for it; else go on as usual.' : 'Its alarms count again from now on.'
  return writeLetter({
    subject: `${about.site}: control is back`,
    first: `${about.site}: control is back since ${momentWords(at, about.zone)}. ${todo}`,
    parts: [
      { facts: [['Controller', about.controller], ['Without control', `${minuteWords((at - from) / 60_000)}, from ${clockBeside(from, at, about.zone)} to ${clockBeside(at, from, about.zone)}`], ...about.code ? [['Outage', about.code] as [string, string]] : []] },
      { say: party === 'shop' ? 'The technician goes on measuring until every case is back within its limit.' : 'The points are put back in auto one by one; single alarms during the next half hour may come from that.' },
    ],
    foot: forContacts(about.site),
  })
}

function productLine({ what, name, product, quantity, unit, place, takenBy, at, by }: ProductNotice, zone: string): string {
  const amount = quantity === null ? product || 'product' : unit ? `${quantity} ${unit} of ${product || 'product'}` : `${quantity} ${product || 'product'}`
  const where = what === 'moved' ? `moved to ${place}` : ['to be discarded', takenBy && `taken by ${takenBy}`, place].filter(Boolean).join(', ')
  return `${name}: ${amount}, ${where} (${by}, ${momentWords(at, zone)})`
}

/** Product was moved, or is to be discarded: to the shop's contact. */
export function productNotice(about: AboutOutage, { items }: { items: readonly ProductNotice[] }): MailText {
  const gone = items.filter(item => item.what === 'discarded')
  const moved = items.filter(item => item.what === 'moved')
  const where = listWords([...new Set(items.map(item => item.name))])
  const what = gone.length > 0 ? 'product is to be discarded' : 'product was moved'
  const todo = gone.length > 0 ? 'Do not sell it, nor put it back; take it off your stock.' : 'Leave it where it is until the technician says that its case is cold.'
  return writeLetter({
    subject: `${about.site}: ${what} (${where})`,
    first: `${about.site}: ${what} from ${where}, now. ${todo}`,
    parts: [
      { head: 'To be discarded', list: gone.map(item => productLine(item, about.zone)) },
      { head: 'Moved', list: moved.map(item => productLine(item, about.zone)) },
      { facts: [['Controller', about.controller], ...about.code ? [['Outage', about.code] as [string, string]] : []] },
      { say: 'The record of the outage holds who decided it, when, and the temperatures that it rests on.' },
    ],
    foot: forContacts(about.site),
  })
}
