/** Settled once migrations and seed are through; requests wait for it. */
let settle: (ready: boolean) => void
const promise = new Promise<boolean>((resolve) => { settle = resolve })
let ready = false

export function markReady(): void { ready = true; settle(true) }
export function isReady(): boolean { return ready }
export function untilReady(): Promise<boolean> { return promise }
