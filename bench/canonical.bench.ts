// What the canonical form of an entry (RFC 8785), which is signed and hashed, costs beside plain JSON.
import { canonicalBytes } from '~~/shared/record/canonical'
import { microseconds } from './measure'

const entry = {
  v: 1,
  id: '0190f2a4-6c1e-7b3a-9d55-0c6f1f0a2b41',
  outage: '0190f2a4-0000-7000-8000-000000000001',
  kind: 'round.reading',
  at: '2026-03-04T05:06:07.089Z',
  skew: -412,
  by: { person: '0190f2a4-0000-7000-8000-00000000000a', device: '0190f2a4-0000-7000-8000-00000000000b' },
  body: {
    round: 3,
    readings: Array.from({ length: 11 }, (_, place) => ({ case: `case-${place}`, celsius: 3.9 + place / 7, place: 'discharge air', note: 'fan guard closed – Wärme', photo: null })),
  },
}
const encoder = new TextEncoder()

const canonical = microseconds(() => canonicalBytes(entry), 2_000)
const baseline = microseconds(() => encoder.encode(JSON.stringify(entry)), 2_000)

process.stdout.write(`${JSON.stringify({
  name: 'canonical bytes of an entry',
  ratio: Number((canonical / baseline).toFixed(2)),
  baseline: 'JSON.stringify of the same entry',
  microseconds: Number(canonical.toFixed(2)),
  baselineMicroseconds: Number(baseline.toFixed(2)),
  bytes: canonicalBytes(entry).length,
})}\n`)
