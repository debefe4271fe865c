import { requireDeletion } from '~~/server/utils/retention/tombstone'

/** What stays of a deleted record: the signed statement, and what it takes to verify it (docs/retention.md). */
export default defineEventHandler(event => requireDeletion(event))
