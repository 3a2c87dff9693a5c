import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { infusionsToHold } from '@/lib/weaning/hold/infusions-to-hold'
import { isTolerated } from '@/lib/weaning/hold/is-tolerated'
import { judgeSafety } from '@/lib/weaning/hold/judge-safety'
import { restartDose } from '@/lib/weaning/hold/restart-dose'
import { defaultProtocol } from '@/lib/weaning/published/default-protocol'
import { judgeStop } from '@/lib/weaning/stop/judge-stop'
import { rulesMet } from '@/lib/weaning/stop/rules-met'
import { HOLD_SAFETY_ITEMS, type HoldSafetyItem } from '@/lib/weaning/vocabulary'
import { at } from '../fixtures'

const { failRules, restartFraction, safetyItems, toleratedAfterMin } = defaultProtocol.hold
const failed = (looks: ReturnType<typeof at>[]) => rulesMet(judgeStop(failRules, null, looks, 24 * 3_600_000)).ids
const calmScreen = Object.fromEntries(HOLD_SAFETY_ITEMS.map((item) => [item, false])) as Record<HoldSafetyItem, boolean>
const minute = (value: number) => value * 60_000

// Awakening trial of Girard 2008, doi:10.1016/S0140-6736(08)60105-1, from a later reuse of that protocol. Worked cases derived.
describe('the worked sedation holds', () => {
  it('fails R-SAT1, 38 breaths for 7 min, and restarts propofol 30 mL/h at 15 mL/h', () => {
    expect(failed([at(20, { breathsPerMin: 38 }), at(27, { breathsPerMin: 38 })])).toEqual(['breaths_high'])
    expect(restartDose({ rateBefore: 30, restartFraction })).toEqual({ known: true, value: 15 })
  })

  it('holds midazolam and leaves fentanyl for rib fractures on, R-SAT2', () => {
    const fentanyl = { drug: 'fentanyl', purpose: 'pain' } as const
    const midazolam = { drug: 'midazolam', purpose: 'sedation' } as const
    expect(infusionsToHold([fentanyl, midazolam])).toEqual([midazolam])
  })

  it('tolerates R-SAT3, calm for 4 h 05 min without opening the eyes', () => {
    const hold = { startedMs: 0, opensEyesToVoice: false, failRulesMet: [], toleratedAfterMin }
    expect(isTolerated({ ...hold, atMs: minute(245) })).toBe(true)
    expect(isTolerated({ ...hold, atMs: minute(240) })).toBe(true)
    expect(isTolerated({ ...hold, atMs: minute(239) })).toBe(false)
  })

  it('is unsafe with cisatracurium running, R-SAT4', () => {
    expect(judgeSafety(safetyItems, { ...calmScreen, neuromuscular_blockade: true })).toEqual({
      result: 'unsafe',
      present: ['neuromuscular_blockade'],
      notAssessed: [],
    })
  })

  it('does not fail R-SAT5, SpO2 87 % for 3 min', () => {
    expect(failed([at(10, { spo2Percent: 87 }), at(13, { spo2Percent: 87 })])).toEqual([])
    expect(failed([at(10, { spo2Percent: 87 }), at(15, { spo2Percent: 87 })])).toEqual(['spo2_low'])
  })
})

describe('isTolerated', () => {
  it('takes the eyes opened to voice at any time', () => {
    expect(isTolerated({ startedMs: 0, atMs: minute(10), opensEyesToVoice: true, failRulesMet: [], toleratedAfterMin })).toBe(
      true,
    )
  })
  it('is never true once a fail rule is met', () => {
    const hold = { startedMs: 0, atMs: minute(300), failRulesMet: ['breaths_high'], toleratedAfterMin }
    expect(isTolerated({ ...hold, opensEyesToVoice: true })).toBe(false)
    expect(isTolerated({ ...hold, opensEyesToVoice: false })).toBe(false)
  })
})

describe('judgeSafety', () => {
  it('is safe only when every item was answered with no', () => {
    expect(judgeSafety(safetyItems, calmScreen).result).toBe('safe')
    for (const item of HOLD_SAFETY_ITEMS) {
      expect(judgeSafety(safetyItems, { ...calmScreen, [item]: null })).toEqual({
        result: 'incomplete',
        present: [],
        notAssessed: [item],
      })
      expect(judgeSafety(safetyItems, { ...calmScreen, [item]: true }).result).toBe('unsafe')
    }
    expect(judgeSafety(safetyItems, {}).result).toBe('incomplete')
  })
  it('is unsafe with one item present even when others are not answered', () => {
    expect(judgeSafety(safetyItems, { raised_icp: true }).result).toBe('unsafe')
  })
  it('asks only the items of the protocol', () => {
    expect(judgeSafety(['raised_icp'], { raised_icp: false, active_seizures: true }).result).toBe('safe')
  })
})

describe('restartDose', () => {
  it.each([
    [null, 'missing'],
    [0, 'implausible'],
    [-4, 'implausible'],
    [Number.NaN, 'implausible'],
  ])('does not answer for a rate of %s', (rateBefore, reason) => {
    expect(restartDose({ rateBefore, restartFraction })).toEqual({ known: false, reason })
  })
  it('does not answer for a fraction that is no reduction', () => {
    expect(restartDose({ rateBefore: 10, restartFraction: 0 })).toEqual({ known: false, reason: 'implausible' })
    expect(restartDose({ rateBefore: 10, restartFraction: 1.5 })).toEqual({ known: false, reason: 'implausible' })
  })
  it('is never more than the rate before and never rounded', () => {
    fc.assert(
      fc.property(fc.integer({ min: 1, max: 100_000 }), (hundredths) => {
        const answer = restartDose({ rateBefore: hundredths / 100, restartFraction: 0.5 })
        expect(answer).toEqual({ known: true, value: hundredths / 200 })
      }),
    )
  })
})
