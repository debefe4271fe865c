// Preloaded with `node -r` into a server under test, and nowhere else: moves the time that JavaScript's Date tells by the
// number of milliseconds written in the file that HOLDOVER_TEST_CLOCK names. Timers and the database keep the true time.
const { readFileSync } = require('node:fs')

const path = process.env.HOLDOVER_TEST_CLOCK
const TrueDate = Date
const trueNow = Date.now

/** Milliseconds since 1970 as the test wants them; a file that is not there yet moves nothing. */
function now() {
  try {
    return trueNow() + (Number(readFileSync(path, 'utf8')) || 0)
  } catch {
    return trueNow()
  }
}

if (path) {
  globalThis.Date = new Proxy(TrueDate, {
    construct: (target, args, newTarget) => Reflect.construct(target, args.length > 0 ? args : [now()], newTarget),
    apply: () => new TrueDate(now()).toString(),
    get: (target, key, receiver) => key === 'now' ? now : Reflect.get(target, key, receiver),
  })
  // So that `made.constructor === Date` holds of a date as it does elsewhere.
  TrueDate.prototype.constructor = globalThis.Date
}
