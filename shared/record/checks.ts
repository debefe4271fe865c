/**
 * The checks that are signed before control is taken away, and on the controller before points go back.
 * Common practice of the trade, no source.
 */
export const BEFORE_CHECKS = [
  { id: 'settings-saved', ask: 'Settings saved off the controller and read back', hint: 'Open the saved copy and compare a few values. Once the update has begun it cannot be saved any more.', mayBeNeedless: false },
  { id: 'update-file', ask: 'Checksum of the update file compared', hint: 'The sum printed by the maker against the sum of the file on your machine.', mayBeNeedless: true },
  { id: 'store-told', ask: 'Store told', hint: 'Doors shut, night covers down, no restocking until control is back.', mayBeNeedless: false },
  { id: 'monitoring-told', ask: 'Monitoring centre told', hint: 'They will hear nothing from this controller, and until when.', mayBeNeedless: true },
  { id: 'no-defrost', ask: 'No case in defrost or drip', hint: 'Look at the coils, not only at the controller.', mayBeNeedless: false },
  { id: 'alarms-alive', ask: 'Leak and person-trapped alarms alive without the controller', hint: 'Or a portable detector is carried, or nobody enters.', mayBeNeedless: false },
  { id: 'second-contact', ask: 'A second means of contact, and who is called if a lone worker is silent', hint: 'Name and number.', mayBeNeedless: false },
] as const

export const BACK_CHECKS = [
  { id: 'version', ask: 'Version is the one planned', hint: 'Read it off the controller.', mayBeNeedless: true },
  { id: 'clock', ask: 'Clock and time zone are right', hint: 'A wrong clock moves every defrost.', mayBeNeedless: false },
  { id: 'settings-compared', ask: 'Settings compared with the saved copy', hint: 'With other firmware: list the differences in the note.', mayBeNeedless: false },
  { id: 'points-list', ask: 'Points list unchanged, or its changes listed', hint: 'Count them and compare tags.', mayBeNeedless: false },
  { id: 'sensors', ask: 'Sensors read sanely', hint: 'No open or shorted sensor; pressures agree with the gauges.', mayBeNeedless: false },
  { id: 'devices', ask: 'Every field device present', hint: 'No board or drive missing on the bus.', mayBeNeedless: false },
  { id: 'outputs', ask: 'Outputs shown are the outputs you see', hint: 'Compare the screen with the relays and the machines.', mayBeNeedless: false },
  { id: 'defrost-schedule', ask: 'Defrost schedule is as it was', hint: 'Times, kinds, lengths.', mayBeNeedless: false },
] as const

export type CheckId = (typeof BEFORE_CHECKS)[number]['id'] | (typeof BACK_CHECKS)[number]['id']
export const CHECK_IDS = [...BEFORE_CHECKS, ...BACK_CHECKS].map(check => check.id) as [CheckId, ...CheckId[]]

export function checkById(id: CheckId) {
  return [...BEFORE_CHECKS, ...BACK_CHECKS].find(check => check.id === id)!
}
