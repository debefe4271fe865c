import { conflict, unprocessable } from '../errors'

/** What is wrong with a value in the midst of its site. */
export interface Fault {
  field: string
  reason: string
  /** true: it clashes with something stored (409); else the field itself is wrong (422) */
  clash?: boolean
}

/** Answers the first fault, if there is one. */
export function refuseFault(fault: Fault | undefined): void {
  if (fault?.clash) conflict(fault.reason, fault.field)
  if (fault) unprocessable(fault.field, fault.reason)
}

/** Whether two names are the same to a person. */
export function sameName(one: string, other: string): boolean {
  return one.trim().toLowerCase() === other.trim().toLowerCase()
}

/** The clash of a name with a sibling's, if there is one. @param self the id of the thing itself, when it is stored */
export function nameClash(siblings: readonly { id: string, name: string }[], name: string, self: string | null, where: string): Fault[] {
  const taken = siblings.some(item => item.id !== self && sameName(item.name, name))
  return taken ? [{ field: 'name', reason: `${where} has one of this name already`, clash: true }] : []
}
