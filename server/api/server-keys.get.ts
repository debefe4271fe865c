import { useDatabase } from '~~/server/utils/database'
import { serverKeys } from '~~/server/utils/record/server-signer'

/** The public keys that this server signs with, or once did: for whoever verifies a record. */
export default defineEventHandler(() => serverKeys(useDatabase()))
