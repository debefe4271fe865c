// The shape of an error answer is this project's own; no published source.
import { describe, expect, it } from 'vitest'
import { readFault } from '~/utils/api-error'

describe('readFault', () => {
  it('takes field and reason from an answer', () => {
    expect(readFault({ status: 409, data: { data: { field: 'email', reason: 'Taken' } } })).toEqual({ status: 409, field: 'email', reason: 'Taken' })
  })

  it('has words where there was no answer or none with a reason', () => {
    expect(readFault(new TypeError('fetch failed'))).toMatchObject({ status: 0, field: null, reason: expect.stringContaining('cannot be reached') })
    expect(readFault({ statusCode: 500, data: { message: 'Server Error' } })).toMatchObject({ status: 500, reason: expect.stringContaining('500') })
    expect(readFault(undefined).status).toBe(0)
  })
})
