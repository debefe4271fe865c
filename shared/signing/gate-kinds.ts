import type { EntryKind } from '../record/kinds'

/** What a person signs: an entry, or the statement with which an administrator deletes a whole record. */
export type SignedAct = EntryKind | 'record-deleted'

/** Acts that open a gate, in the words with which the PIN is asked for: always, however lately it was given. */
export const GATES: Partial<Record<SignedAct, string>> = {
  'plan-approved': 'to approve the plan',
  'went-dark': 'to go dark',
  'control-back': 'to sign that control is back',
  'hands-offered': 'to offer your work',
  'hands-taken': 'to take the work over',
  'submitted': 'to submit the record',
  'sealed': 'to countersign and seal',
  'record-deleted': 'to delete the record',
}
