import { defineStore } from 'pinia'
import { computed, ref, shallowRef } from 'vue'
import type { OutboxEntry, Trouble } from '~/offline/outbox-ports'
import { isWaiting } from '~/offline/outbox-ports'

/** What this device holds of everybody, and how sending it goes: read anew at each change by the plugin that sends. */
export const useSending = defineStore('sending', () => {
  /** who is taken to be signed in on this device */
  const person = ref<string | null>(null)
  const kept = shallowRef<OutboxEntry[]>([])
  /** why the entries of an outage wait, by outage */
  const troubles = shallowRef<ReadonlyMap<string, Trouble>>(new Map())
  /** current: the session is the person's; ended: nobody's; unheard: the server could not be asked yet */
  const session = ref<'unheard' | 'current' | 'ended'>('unheard')

  const own = computed(() => kept.value.filter(item => item.person === person.value))
  const waiting = computed(() => own.value.filter(isWaiting))
  const refused = computed(() => own.value.filter(item => item.refusal !== null))
  /** entries of other people that were never sent: they wait for their signers */
  const others = computed(() => kept.value.filter(item => item.person !== person.value && isWaiting(item)))
  return { person, kept, troubles, session, own, waiting, refused, others }
})
