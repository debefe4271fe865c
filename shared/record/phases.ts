/** The phases of an outage, in the order in which they come. */
export const PHASES = ['plan', 'approved', 'in-hand', 'dark', 'hand-back', 'settle', 'submitted', 'sealed', 'called-off'] as const
export type Phase = (typeof PHASES)[number]

/** Phases as people read them. */
export const PHASE_WORDS: Record<Phase, string> = {
  'plan': 'Plan',
  'approved': 'Approved',
  'in-hand': 'In hand',
  'dark': 'Dark',
  'hand-back': 'Hand back',
  'settle': 'Settle',
  'submitted': 'Submitted',
  'sealed': 'Sealed',
  'called-off': 'Called off',
}

/** Phases in which somebody still has work to do on the site. */
export const LIVE_PHASES: readonly Phase[] = ['in-hand', 'dark', 'hand-back', 'settle']
