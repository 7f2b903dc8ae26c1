import { describe, expect, it } from 'vitest'
import type { WorkFact } from '../../../../shared/domain/staleness'
import { staleReason } from '../../../../shared/domain/staleness'

const work = (values: Partial<WorkFact>): WorkFact => ({
  id: 'w1', hand: 'done_by_us', loggedAt: '2026-11-10T10:00:00.000Z', withdrawn: false, place: 'C14', before: '0.1 µF paper', after: '0.1 µF film', ...values,
})
const signedAt = '2026-11-09T16:00:00.000Z'

describe('staleReason', () => {
  it('names the work that was logged after the sheet was signed', () => {
    expect(staleReason(signedAt, [work({})])).toEqual({
      workId: 'w1', sentence: 'Work was logged after it was signed (C14: 0.1 µF paper, now 0.1 µF film): what was measured then may have changed.',
    })
  })

  it('names the earliest of several', () => {
    const later = work({ id: 'w2', loggedAt: '2026-11-12T10:00:00.000Z' })
    expect(staleReason(signedAt, [later, work({})])?.workId).toBe('w1')
  })

  it('counts work at the very time of the signature as later', () => {
    expect(staleReason(signedAt, [work({ loggedAt: signedAt })])).not.toBeNull()
  })

  it.each([
    ['work logged before', work({ loggedAt: '2026-11-09T15:59:59.999Z' })],
    ['what an earlier hand did', work({ hand: 'found_like_this' })],
    ['what was left alone', work({ hand: 'left_alone' })],
    ['an entry withdrawn since', work({ withdrawn: true })],
  ])('lets the sheet stand after %s', (_name, entry) => {
    expect(staleReason(signedAt, [entry])).toBeNull()
  })

  it('never calls an open sheet stale', () => {
    expect(staleReason(null, [work({})])).toBeNull()
  })
})
