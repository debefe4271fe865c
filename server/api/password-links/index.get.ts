import { isMailOn } from '~~/server/utils/mail/settings'

/** Whether a link to a new password can be sent at all. */
export default defineEventHandler(() => ({ on: isMailOn() }))
