/** Job that looks at the alerts of one outage at once. Its name stands apart, since whoever asks for it is needed by what it does. */
export const ALERT_NOW = 'alert-now'
/** Job that makes exports of records. */
export const MAKE_EXPORTS = 'make-exports'
