/** What every letter about an outage knows of it. */
export interface AboutOutage {
  site: string
  controller: string
  /** null while it has none */
  code: string | null
  work: string
  planned: boolean
  /** IANA */
  zone: string
  /** address of the outage in Holdover */
  url: string
}

/** Facts that stand in each of them. */
export function outageFacts({ site, controller, code, work }: AboutOutage): [string, string][] {
  return [['Site', site], ['Controller', controller], ['Work', work], ...code ? [['Outage', code] as [string, string]] : []]
}

/** Why it came to somebody with an account. */
export const FOR_ACCOUNTS = 'Written by Holdover because of your account there. Nobody reads what is answered to this address.'
/** Why it came to somebody without one. */
export function forContacts(site: string): string {
  return `Written by Holdover because you are named as whom to tell at ${site}. Nobody reads what is answered to this address; in need, call the technician on site.`
}
