// Stands in for vitest where mutants are tried: collects plain tests without hooks, to be run in order by `runner.mjs`.
import { ASYMMETRIC_MATCHERS_OBJECT, chai, GLOBAL_EXPECT, JestAsymmetricMatchers, JestChaiExpect, JestExtend, setState } from '@vitest/expect'

chai.use(JestExtend)
chai.use(JestChaiExpect)
chai.use(JestAsymmetricMatchers)

export const expect = Object.assign((value, message) => chai.expect(value, message), chai.expect, globalThis[ASYMMETRIC_MATCHERS_OBJECT])
globalThis[GLOBAL_EXPECT] = expect
setState({ assertionCalls: 0 }, expect)

/** Every test in the order of the files: { name, work }; the runner takes them from here after it loaded the bundle. */
const tests = globalThis.gatheredTests = []
let group = ''

export function describe(name, work) {
  const outer = group
  group += `${name} > `
  work()
  group = outer
}

export function it(name, work) {
  tests.push({ name: group + name, work })
}

const listed = value => Array.isArray(value) ? value : [value]
/** One test or group a row; rows are told apart by their place, since names of rows may be the same. */
const each = make => rows => (name, work) => rows.forEach((row, index) => make(`${name} #${index}`, () => work(...listed(row))))
describe.each = each(describe)
it.each = each(it)
