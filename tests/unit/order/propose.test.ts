/** What a kind is proposed to do in hand is common practice of the trade; no published source. */
import { describe, expect, it } from 'vitest'
import { parseOrderInput, planOrder, proposeHand } from '../../../server/utils/order'
import { POINT_KINDS } from '../../../shared/schemas/point-kinds'

const on = { compressorOn: true }
const off = { compressorOn: false }

describe('the proposed hand position', () => {
  it('takes heat off and keeps fans, lights and ventilation on', () => {
    expect(proposeHand({ kind: 'defrost-heater' }, on)).toBe('off')
    expect(proposeHand({ kind: 'hot-gas-valve' }, on)).toBe('closed')
    for (const kind of ['evaporator-fan', 'condenser-fan', 'pump', 'anti-sweat-heater', 'light', 'egress-light', 'ventilation', 'machinery-room-ventilation'] as const) {
      expect(proposeHand({ kind }, off)).toBe('on')
    }
  })

  it('opens liquid valves only where a compressor of their group will be on', () => {
    for (const kind of ['liquid-line-valve', 'expansion-valve'] as const) {
      expect(proposeHand({ kind }, on)).toBe('open')
      expect(proposeHand({ kind }, off)).toBe('closed')
      expect(proposeHand({ kind, hand: 'open' }, off)).toBe('closed')
    }
    expect(proposeHand({ kind: 'liquid-line-valve' }, { ...off, expansionValveInCircuit: true })).toBe('as-found')
  })

  it('uses the usual position where the rules let it stand', () => {
    expect(proposeHand({ kind: 'compressor', hand: 'on' }, on)).toBe('on')
    expect(proposeHand({ kind: 'drive', hand: { hz: 42 } }, on)).toEqual({ hz: 42 })
    expect(proposeHand({ kind: 'expansion-valve', hand: { percent: 35 } }, on)).toEqual({ percent: 35 })
    expect(proposeHand({ kind: 'light', hand: 'off' }, on)).toBe('off')
    expect(proposeHand({ kind: 'defrost-heater', hand: 'on' }, on)).toBe('off')
    expect(proposeHand({ kind: 'leak-alarm', hand: 'off' }, on)).toBe('as-found')
    expect(proposeHand({ kind: 'egress-light', hand: 'off' }, on)).toBe('on')
    expect(proposeHand({ kind: 'compressor', hand: null }, on)).toBe('off')
  })

  it('is never one that the rules refuse, whatever the kind', () => {
    for (const compressorOn of [true, false]) {
      const points = POINT_KINDS.map(kind => ({
        tag: kind,
        kind,
        rack: 'A',
        circuit: /evaporator|liquid|expansion|defrost|hot-gas/.test(kind) ? '1' : undefined,
        hand: proposeHand({ kind, hand: kind === 'compressor' && compressorOn ? 'on' : null }, { compressorOn, expansionValveInCircuit: true }),
      }))
      const parsed = parseOrderInput({ direction: 'in-hand', points })
      expect(parsed.ok && planOrder(parsed.input).refusals).toEqual([])
    }
  })
})
