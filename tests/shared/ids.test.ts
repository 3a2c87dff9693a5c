import { describe, expect, it } from 'vitest'
import { newId } from '@/lib/shared/ids'

describe('newId', () => {
  it('is 24 characters that are safe in an address', () => {
    for (let made = 0; made < 200; made += 1) expect(newId()).toMatch(/^[0-9a-z]{24}$/)
  })

  it('does not come twice, and uses every character at every place', () => {
    const ids = Array.from({ length: 5_000 }, newId)
    expect(new Set(ids).size).toBe(ids.length)
    for (let place = 0; place < 24; place += 1) expect(new Set(ids.map((id) => id.charAt(place))).size).toBe(36)
  })
})
