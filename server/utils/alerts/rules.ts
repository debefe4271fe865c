import type { AlertRules } from './finding'
import { ACT_DUE, DISCARD_DUE, LIMIT_NEAR } from './product-rules'
import { ROUND_LATE, ROUND_MISSED, UNHEARD, WORKER_SILENT } from './round-rules'
import { LEFT_IN_HAND, OVERRIDE_PAST, OVERRUN, PRESSURE, TURN_BACK_PAST } from './work-rules'

/** Every kind of alert; a missing one is a compile error. */
export const ALERT_RULES: AlertRules = {
  'round-late': ROUND_LATE,
  'round-missed': ROUND_MISSED,
  'limit-near': LIMIT_NEAR,
  'act-due': ACT_DUE,
  'discard-due': DISCARD_DUE,
  'pressure': PRESSURE,
  'overrun': OVERRUN,
  'turn-back-past': TURN_BACK_PAST,
  'override-past': OVERRIDE_PAST,
  'left-in-hand': LEFT_IN_HAND,
  'unheard': UNHEARD,
  'worker-silent': WORKER_SILENT,
}
