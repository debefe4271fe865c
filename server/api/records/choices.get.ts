import { requirePerson } from '~~/server/utils/access'
import { recordChoices } from '~~/server/utils/records/choices'

/** Sites, controllers, people and kinds of work that a search for records may name. */
export default defineEventHandler(event => recordChoices(requirePerson(event)))
