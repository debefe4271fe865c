import { z } from 'zod'
import { PASSWORD_PURPOSES } from './password-links'

/** Parameters of the routes that open a link to a password. */
export const passwordLinkParams = z.object({ purpose: z.enum(PASSWORD_PURPOSES), token: z.string().max(1000) })
