// What letters say is this project's own; no published source.
import { describe, expect, it } from 'vitest'
import { alertLetter } from '../../../server/emails/alert'
import { deviceEnrolled, invitation, passwordReset, passwordSet } from '../../../server/emails/account'
import { calledOff, controlBack, noticeToMonitoring, noticeToShop, productNotice } from '../../../server/emails/notices'
import type { AboutOutage } from '../../../server/emails/outage'
import { planApproved, planReturned, planWaiting } from '../../../server/emails/plans'
import { recordSealed } from '../../../server/emails/record'
import { writeLetter } from '../../../server/emails/letter'
import type { MailText } from '../../../server/utils/mail/write'

const HOME = 'https://holdover.example'
const FROM = Date.UTC(2026, 2, 3, 8)
const UNTIL = FROM + 70 * 60_000
const LINK = `${HOME}/notice/abc.def`
const about: AboutOutage = { site: 'Quarry Street', controller: 'Rack A controller', code: 'Q027-0041', work: 'Software update', planned: true, zone: 'America/Chicago', url: `${HOME}/outages/1` }
const window = { from: FROM, until: UNTIL }
const product = { entry: '1', name: 'Fish service', product: 'plaice', quantity: 12, unit: 'kg', place: 'bin 4', takenBy: 'Odalys Brandt', at: FROM, by: 'Juno Tarrant' }

/** Each letter with its first line. */
const LETTERS: [name: string, letter: MailText, first: string][] = [
  ['plan waiting', planWaiting(about, { by: 'Juno Tarrant', begins: FROM, until: UNTIL, note: 'At night' }), 'Quarry Street: the plan for “Software update” waits for a supervisor. Approve or return it before Tue 3 Mar 2026, 02:00.'],
  ['plan waiting at no set time', planWaiting(about, { by: 'Juno Tarrant', begins: null, until: null, note: '' }), 'Quarry Street: the plan for “Software update” waits for a supervisor. Approve or return it soon.'],
  ['plan approved', planApproved(about, { by: 'Sabine Ockham', begins: FROM, note: '' }), 'Quarry Street: Sabine Ockham approved the plan for “Software update”. Begin on Tue 3 Mar 2026, 02:00.'],
  ['plan returned', planReturned(about, { by: 'Sabine Ockham', begins: FROM, reason: 'Too near to the delivery' }), 'Quarry Street: Sabine Ockham returned the plan for “Software update”. Change it and send it again before Tue 3 Mar 2026, 02:00.'],
  ['notice to a shop', noticeToShop(about, { window, cases: ['Dairy wall', 'Fish service'], measures: ['night covers drawn: Dairy wall'], by: 'Juno Tarrant', cause: '', link: LINK }), 'Quarry Street: refrigeration control is taken away from Tue 3 Mar 2026, 02:00, until about 03:10. Doors shut, night covers down, no restocking.'],
  ['notice of a loss', noticeToShop({ ...about, planned: false }, { window: { from: FROM, until: null }, cases: [], measures: [], by: 'Juno Tarrant', cause: 'Screen went black', link: LINK }), 'Quarry Street: refrigeration control was lost on Tue 3 Mar 2026, 02:00; nobody can say yet until when. Doors shut, night covers down, no restocking.'],
  ['notice to a monitoring centre', noticeToMonitoring(about, { window, by: 'Juno Tarrant', link: LINK }), 'Quarry Street: expect silence from Rack A controller from Tue 3 Mar 2026, 02:00, until about 03:10. Do not call out; alarms that it would send are not sent.'],
  ['called off', calledOff(about, { at: FROM, reason: 'No part' }), 'Quarry Street: “Software update” is called off since Tue 3 Mar 2026, 02:00. Refrigeration control stays on; go on as usual.'],
  ['control back, to a shop', controlBack(about, { party: 'shop', at: UNTIL, from: FROM }), 'Quarry Street: control is back since Tue 3 Mar 2026, 03:10. Keep night covers down where the technician asks for it; else go on as usual.'],
  ['control back, to a monitoring centre', controlBack(about, { party: 'monitoring', at: UNTIL, from: FROM }), 'Quarry Street: control is back since Tue 3 Mar 2026, 03:10. Its alarms count again from now on.'],
  ['discarded', productNotice(about, { items: [{ ...product, what: 'discarded' }, { ...product, what: 'moved', name: 'Dairy wall' }] }), 'Quarry Street: product is to be discarded from Fish service and Dairy wall, now. Do not sell it, nor put it back; take it off your stock.'],
  ['moved', productNotice(about, { items: [{ ...product, what: 'moved' }] }), 'Quarry Street: product was moved from Fish service, now. Leave it where it is until the technician says that its case is cold.'],
  ['sealed', recordSealed(about, { by: 'Sabine Ockham', at: FROM, size: 206, root: 'ab'.repeat(32), verifyUrl: `${HOME}/verify`, account: true }), 'Quarry Street: Sabine Ockham sealed the record Q027-0041 on Tue 3 Mar 2026, 02:00. Keep this letter: its root shows that nothing was changed since.'],
  ['alert', alertLetter(about, ['Quarry Street: round 3 is late since 02:14, read Fish service now', 'Quarry Street: Dairy wall reaches its limit at 02:40']), 'Quarry Street: round 3 is late since 02:14, read Fish service now'],
  ['invitation', invitation({ name: 'Maud Finch', by: 'Ada Brook', role: 'technician', until: FROM, url: `${HOME}/welcome/abc.def` }), 'Maud Finch: Ada Brook made you an account in Holdover. Choose a password by 2026-03-03 08:00 UTC.'],
  ['password reset', passwordReset({ name: 'Maud Finch', until: FROM, url: `${HOME}/new-password/abc.def` }), 'Maud Finch: a new password was asked for. If that was you, choose one by 2026-03-03 08:00 UTC.'],
  ['password set', passwordSet({ name: 'Maud Finch', at: FROM, how: 'reset' }), 'Maud Finch: your password was set by a link in a letter to this address at 2026-03-03 08:00 UTC. If that was not you, tell an administrator at once.'],
  ['device enrolled', deviceEnrolled({ name: 'Maud Finch', device: 'Phone', at: FROM, replaced: true, url: `${HOME}/account` }), 'Maud Finch: the device “Phone” was enrolled at 2026-03-03 08:00 UTC and can sign in your name. If that was not you, revoke it now.'],
]

describe.each(LETTERS)('%s', (_name, { subject, text, html }, first) => {
  it('says site or person, what, until when and what to do in its first line', () => {
    expect(text.split('\n')[0]).toBe(first)
    expect(html).toContain(first.replace(/"/g, '&quot;'))
  })

  it('has a subject of one line that mail programs show whole', () => {
    expect(subject).not.toMatch(/[\r\n]/)
    expect(subject.length).toBeGreaterThan(5)
    expect(subject.length).toBeLessThanOrEqual(120)
  })

  it('fetches nothing from anywhere, and leads nowhere but to Holdover', () => {
    expect(html).not.toMatch(/<(img|link|script|style|iframe|object|video|audio|form)\b|url\(|@import|\bsrc=|background=/i)
    for (const [, address] of html.matchAll(/href="([^"]*)"/g)) expect(address).toMatch(/^https:\/\/holdover\.example\//)
    expect([...text.matchAll(/https?:\/\/\S+/g)].map(([address]) => address).sort()).toEqual([...html.matchAll(/href="([^"]*)"/g)].map(([, address]) => address).sort())
  })

  it('says the same in text and HTML', () => {
    const read = html.replace(/^[\s\S]*<body[^>]*>/, '').replace(/<[^>]+>/g, ' ').replace(/&quot;/g, '"').replace(/&lt;/g, '<').replace(/&gt;/g, '>').replace(/&amp;/g, '&')
    for (const word of text.replace(/https?:\/\/\S+/g, '').match(/[\p{L}\d]{3,}/gu)!) expect(read).toContain(word)
  })
})

describe('what a shop must know', () => {
  const [, { text }] = LETTERS.find(([name]) => name === 'notice to a shop')!
  it('is there: what, when, how long, what to do, which cases, and the link', () => {
    for (const words of ['Keep the doors of cases and cold rooms shut.', 'Draw the night covers and leave them down.', 'Do not restock', 'night covers drawn: Dairy wall', 'Software update', 'about 1 h 10', '- Fish service', `I have read this:\n${LINK}`]) expect(text).toContain(words)
  })

  it('counts cases that are too many to name', () => {
    const cases = Array.from({ length: 15 }, (_, index) => `Case ${index + 1}`)
    const { text } = noticeToShop(about, { window, cases, measures: [], by: 'Juno Tarrant', cause: '', link: LINK })
    expect(text).toContain('- Case 12\n- and 3 more cases')
  })
})

describe('a letter', () => {
  it('lets no word of somebody\'s become markup, and no subject a second line', () => {
    const { subject, html } = writeLetter({ subject: 'one\r\nBcc: everybody', first: '<b>"x" & y</b>', parts: [{ facts: [['<i>', '<script>']] }, { list: ['<u>'], head: '<h>' }], foot: '<f>' })
    expect(subject).toBe('one Bcc: everybody')
    expect(html).toContain('&lt;b&gt;&quot;x&quot; &amp; y&lt;/b&gt;')
    expect(html).not.toMatch(/<(b|i|script|u|h|f)>/)
  })

  it('leaves out a list of nothing', () => {
    expect(writeLetter({ subject: 's', first: 'f', parts: [{ list: [], head: 'Nothing' }], foot: 'x' }).text).toBe('f\n\n-- \nx')
  })

  it('cuts a subject that is too long', () => {
    expect(writeLetter({ subject: 'x'.repeat(300), first: 'f', parts: [], foot: '' }).subject).toBe(`${'x'.repeat(119)}…`)
  })
})
