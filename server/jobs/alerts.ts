import { lookForAlerts, sweepAlerts } from '../utils/alerts/sweep'
import type { Job } from './job'
import { ALERT_NOW } from './names'

/** Enters what time alone has brought to outages, and alerts whom it concerns. */
export const alertsJob: Job = {
  name: 'alerts',
  every: 20,
  run: sweepAlerts,
}

/** Looks at one outage at once, after an entry that may be alerted. */
export const alertNowJob: Job<{ outage: string }> = {
  name: ALERT_NOW,
  async run(db, now, { outage }) {
    await lookForAlerts(db, outage, now)
  },
}
