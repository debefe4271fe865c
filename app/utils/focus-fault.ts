import { nextTick } from 'vue'

/** Puts the cursor into the first field that is wrong, once the page shows it. */
export async function focusFirstFault(): Promise<void> {
  await nextTick()
  document.querySelector<HTMLElement>(':is(input, select, textarea)[aria-invalid="true"]')?.focus()
}
