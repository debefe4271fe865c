import { countWords, durationWords } from '../../shared/charts/words'
import { DISCLAIMER, outageCautions } from '../../shared/record/cautions'
import { nameOf } from '../../shared/record/select'
import { fullStampWords } from '../../shared/record/summary-words'
import { standstillWords } from '../utils/cover/standstill-words'
import type { RecordPaper } from './record'
import type { Sheet } from './sheet'
import type { Row } from './table'
import { drawTable } from './table'

/** Who signed, with which key; and what was verified while the paper was made. */
export async function drawProof(sheet: Sheet, { state, entries, verified, summary, sealHolds }: RecordPaper): Promise<void> {
  const { timeZone } = summary.heading
  sheet.begin('Signers')
  const counts = new Map<string, number>()
  for (const { entry } of entries) counts.set(entry.device, (counts.get(entry.device) ?? 0) + 1)
  await drawTable(sheet, [{ label: 'Name', width: 0.4 }, { label: 'Role', width: 66 }, { label: 'Device', width: 0.3 }, { label: 'Entries', width: 42, align: 'right' }, { label: 'Public key (Ed25519)', width: 192, style: { face: 'mono', size: 7 } }],
    Object.entries(state.signers).map(([device, signer]): Row => [signer.name, signer.role, signer.deviceName, String(counts.get(device) ?? 0), signer.publicKey]))
  sheet.begin('What this paper shows')
  const bad = entries.filter(stored => verified.get(stored.seq) !== true)
  sheet.paragraph(bad.length === 0
    ? `The signature of each of the ${countWords(entries.length, 'entry', 'entries')} was verified against its signer's key while this paper was made. “ok” and the first four and last two digits stand beside each entry.`
    : `The signatures of ${countWords(bad.length, 'entry', 'entries')} do not fit their signer's key: No. ${bad.map(stored => stored.seq).join(', ')}.`)
  const { sealed } = state
  if (sealed) {
    sheet.paragraph(`Sealed ${fullStampWords(sealed.mark.at, timeZone)} by ${nameOf(state, sealed.mark.by)} over ${countWords(sealed.size, 'entry', 'entries')}. ${sealHolds ? 'The root of those entries, worked out anew for this paper, is the one that was sealed.' : 'The root of those entries, worked out anew for this paper, is NOT the one that was sealed.'} Root (RFC 9162):`)
    sheet.paragraph(sealed.root, { style: { face: 'mono', size: 7.5 } })
    sheet.paragraph('A change by anyone without the devices\' private keys would show in the record itself. Whoever owns the database and signs everything anew makes another record with another root: compare this one with the root that was sent out when it was sealed.')
  } else {
    sheet.paragraph('This record is not sealed: it may still grow.')
  }
  if (state.largestSkew && state.largestSkew.ms > 1000) sheet.paragraph(`Times are the devices' own, less their last measured difference from the server; the largest was ${durationWords(state.largestSkew.ms / 1000)}.`)
}

export function drawCautions(sheet: Sheet, { state }: RecordPaper): void {
  sheet.begin('Cautions')
  sheet.list(() => {
    for (const words of standstillWords(state.snapshot)) sheet.paragraph(words, { after: 3 })
    for (const caution of outageCautions(state)) sheet.paragraph(`${caution.hazard.toUpperCase()}: ${caution.words}`, { after: 3 })
  })
  sheet.paragraph(DISCLAIMER, { style: { face: 'semibold' } })
}

/** Room for the whole part, so that it stands on the last page undivided. */
const VERIFYING_HEIGHT = 250

/** How a reader checks the record without trusting this paper. */
export function drawVerifying(sheet: Sheet, { state, variant }: RecordPaper): void {
  sheet.begin('How to verify this record', VERIFYING_HEIGHT)
  const { sealed } = state
  const file = variant === 'record' ? 'This PDF carries the whole record as the attached file record.json.' : 'This PDF carries no file: take record.json from the page of the record.'
  sheet.paragraph(`The paper is made from the record; it is not the record. ${file} ${sealed ? 'Have the root ready that was sent out by e-mail when the record was sealed, from a message that did not come with this paper.' : 'While it is not sealed, there is no root to compare it with.'}`, { after: 6 })
  const given = variant === 'record' ? 'this PDF or record.json' : 'record.json'
  sheet.list(() => {
    sheet.labelled('In a browser', `Open the page /verify of any Holdover server, without an account, and choose ${given}; the file does not leave the browser. Enter the root. It checks every signature, each device's chain, the server's checkpoints and the seal, and says whether the record is whole in itself, and whether it is the one that was sealed.`)
    sheet.labelled('With one program', `node scripts/verify.mjs ${variant === 'record' ? 'record.pdf' : 'record.json'}${sealed ? ' ROOT' : ''} does the same with plain Node and shares no code with the program that made the record.`)
    sheet.labelled('By hand', 'With OpenSSL and a text editor: in record.json each entry stands on a line of its own, in the canonical JSON (RFC 8785) that was signed. Verify its signature (Ed25519, RFC 8032) with the key under Signers. The root: SHA-256 over a zero byte and each line, joined in pairs over a byte one (RFC 9162, 2.1.1). docs/verify-by-hand.md has the commands.')
  })
  if (sealed) {
    sheet.paragraph(`Root of ${countWords(sealed.size, 'entry', 'entries')}, as sealed:`, { after: 1 })
    sheet.paragraph(sealed.root, { style: { face: 'mono', size: 7.5 } })
  }
  sheet.paragraph('What this proves: nobody without the signers\' private keys changed what they signed, and with the root, that this is the record that was sealed. It does not prove that what was signed is true.', { style: { size: 8 } })
}
