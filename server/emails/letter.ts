import { palette } from '../../shared/look/palette'
import type { MailText } from '../utils/mail/write'

/** A piece of a letter. */
export type Part
  = | { say: string }
    | { facts: [label: string, value: string][] }
    | { list: readonly string[], head: string }
    /** what is pressed, and where it leads */
    | { press: string, url: string }

/** A letter: the first line says site, what, until when and what to do. `foot` says why it came. */
export interface Letter { subject: string, first: string, parts: Part[], foot: string }

const { paper, sheet, ink, 'ink-2': second, rule } = palette.paper
const FONT = '\'IBM Plex Sans\',Helvetica,Arial,sans-serif'
/** Longest subject that is shown whole by most readers of mail, characters. Common practice, no source. */
const SUBJECT_MAX = 120

/** Text and HTML of a letter. No picture and nothing from elsewhere: what is read is what was sent. */
export function writeLetter({ subject, first, parts, foot }: Letter): MailText {
  const oneLine = subject.replace(/\s+/g, ' ').trim()
  return {
    subject: oneLine.length > SUBJECT_MAX ? `${oneLine.slice(0, SUBJECT_MAX - 1)}…` : oneLine,
    text: [first, ...parts.map(textOf).filter(Boolean), `-- \n${foot}`].join('\n\n'),
    html: pageOf(oneLine, [`<p style="margin:0 0 16px;font-size:20px;line-height:28px;font-weight:600">${escape(first)}</p>`, ...parts.map(htmlOf)].join('\n'), foot),
  }
}

function textOf(part: Part): string {
  if ('say' in part) return part.say
  if ('facts' in part) return part.facts.map(([label, value]) => `${label}: ${value}`).join('\n')
  if ('list' in part) return part.list.length > 0 ? [part.head, ...part.list.map(item => `- ${item}`)].join('\n') : ''
  return `${part.press}:\n${part.url}`
}

function htmlOf(part: Part): string {
  if ('say' in part) return `<p style="margin:0 0 16px">${escape(part.say)}</p>`
  if ('facts' in part) {
    return `<table role="presentation" cellpadding="0" cellspacing="0" style="margin:0 0 16px;border-collapse:collapse;width:100%">${part.facts.map(([label, value]) =>
      `<tr><td style="padding:6px 16px 6px 0;border-top:1px solid ${rule};color:${second};vertical-align:top;width:33%">${escape(label)}</td><td style="padding:6px 0;border-top:1px solid ${rule};overflow-wrap:anywhere">${escape(value)}</td></tr>`).join('')}</table>`
  }
  if ('list' in part) {
    return part.list.length > 0 ? `<p style="margin:0 0 4px;font-weight:600">${escape(part.head)}</p><ul style="margin:0 0 16px;padding-left:20px">${part.list.map(item => `<li style="margin:0 0 4px">${escape(item)}</li>`).join('')}</ul>` : ''
  }
  return `<p style="margin:24px 0"><a href="${escape(part.url)}" style="display:inline-block;padding:16px 20px;border-radius:6px;background-color:${ink};color:${sheet};font-weight:600;text-decoration:none">${escape(part.press)}</a></p>`
}

function pageOf(title: string, body: string, foot: string): string {
  return `<!DOCTYPE html>
<html lang="en"><head><meta charset="utf-8"><meta name="viewport" content="width=device-width, initial-scale=1"><meta name="color-scheme" content="light"><title>${escape(title)}</title></head>
<body style="margin:0;padding:0;background-color:${paper};color:${ink};font-family:${FONT};font-size:17px;line-height:26px">
<div style="max-width:560px;margin:0 auto;padding:24px 20px">
<p style="margin:0 0 20px;padding:0 0 12px;border-bottom:1px solid ${rule};font-weight:700;font-size:20px">Holdover</p>
${body}
<p style="margin:28px 0 0;padding:12px 0 0;border-top:1px solid ${rule};color:${second};font-size:15px;line-height:22px">${escape(foot)}</p>
</div>
</body></html>`
}

function escape(text: string): string {
  return text.replace(/&/g, '&amp;').replace(/</g, '&lt;').replace(/>/g, '&gt;').replace(/"/g, '&quot;').replace(/\n/g, '<br>')
}
