import { computed, onMounted, ref, shallowRef } from 'vue'
import type { DeletionFacts, DeletionStatement } from '~~/shared/record/deletion'
import { deletionBytes, factsOf } from '~~/shared/record/deletion'
import { isoTime } from '~~/shared/record/entry'
import { uuidv7 } from '~~/shared/record/uuid'
import type { RecordRetention } from '~~/shared/schemas/retention'
import { useRecord } from '~/composables/useRecord'
import { useUser } from '~/composables/useUser'
import { fetchServerTime } from '~/queries/entries'
import { deleteRecord, fetchRetention } from '~/queries/retention'
import { NotUnlocked, useSigner } from '~/stores/signer'
import { readFault } from '~/utils/api-error'

/** Deleting a record: the whole log is read here, so that what is signed is what this browser saw. */
export function useDeletion(id: string) {
  const user = useUser()
  const signer = useSigner()
  const record = useRecord(id)
  const retention = shallowRef<RecordRetention | null>(null)
  const busy = ref(false)
  const trouble = ref('')
  onMounted(async () => {
    if (user.value) await signer.load(user.value.id)
    retention.value = await fetchRetention(id).catch(() => null)
  })

  /** What the statement will say of the record; null while it is being read, or has not ended. */
  const facts = computed<DeletionFacts | null>(() => {
    const known = retention.value
    if (!record.complete.value || !known || known.over === null) return null
    return factsOf(record.state.value, record.entries.value, { years: known.years, over: known.over, files: known.files })
  })
  /** Why it cannot be deleted, in words; empty where it can. */
  const barred = computed(() => {
    const known = retention.value
    if (!known) return ''
    if (known.held) return 'This record is under legal hold. It cannot be deleted until the hold is lifted.'
    if (known.over === null) return 'This outage has not ended: its retention has not begun.'
    return Date.parse(known.over) > Date.now() ? 'Its retention is not over yet.' : ''
  })

  /** Signs the statement, which always asks for the PIN, and sends it. @returns whether the record is deleted */
  async function sign(reason: string): Promise<boolean> {
    if (busy.value || !facts.value || !user.value) return false
    busy.value = true
    trouble.value = ''
    try {
      const key = await signer.unlocked('record-deleted')
      const asked = Date.now()
      const serverTime = await fetchServerTime()
      const now = Date.now()
      const statement: DeletionStatement = {
        ...facts.value, type: 'holdover-deletion', version: 1, id: uuidv7(now), reason: reason.trim(), at: isoTime(now),
        skew: Math.round((asked + now) / 2 - Date.parse(serverTime)), by: user.value.id, name: user.value.name, device: key.device,
      }
      await deleteRecord(id, { statement, signature: await key.sign(deletionBytes(statement)) })
      return true
    } catch (error) {
      trouble.value = error instanceof NotUnlocked ? error.message : readFault(error).reason
      return false
    } finally {
      busy.value = false
    }
  }

  return { ...record, retention, facts, barred, signer, busy, trouble, sign }
}
