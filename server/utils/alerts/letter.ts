import type { OutageState } from '../../../shared/record/state'
import { ownOrigin } from '../origin'
import type { MailText } from '../mail/write'

/** A mail of one or more alerts of an outage: the first line says site, what, until when and what to do. @param words of each alert, as the record has them */
export function alertLetterOf(state: OutageState, words: readonly string[]): MailText {
  const url = `${ownOrigin('http://127.0.0.1:3000')}/outages/${state.id}`
  const [first = '', ...others] = words
  const lines = [first, ...others.length > 0 ? ['At the same time:', ...others.map(line => `- ${line}`)] : [], `${state.code ?? ''} ${state.plan.workKind.name}`.trim(), `See it, and say that you have: ${url}`]
  return { subject: first.slice(0, 120), text: lines.join('\n\n'), html: `<p>${lines.map(escape).join('</p><p>')}</p>` }
}

const escape = (text: string) => text.replace(/&/g, '&amp;').replace(/</g, '&lt;').replace(/>/g, '&gt;')
