import { describe, expect, it } from 'vitest'
import { predictedBodyWeight } from '@/lib/weaning/indices/predicted-body-weight'
import { tidalVolumePerKg } from '@/lib/weaning/indices/tidal-volume-per-kg'
import type { Sex } from '@/lib/weaning/vocabulary'

const weightOf = (sex: Sex, heightCm: number) => {
  const answer = predictedBodyWeight({ sex, heightCm, isAdult: true })
  if (!answer.known) throw new Error(`no weight: ${answer.reason}`)
  return answer.value
}

/** ARDS Network chart: sex, inches, centimetres, kg, mL at 4, 5, 6, 7 and 8 mL/kg. The chart from memory, its numbers recomputed. */
const CHART: [Sex, number, number, number, number, number, number, number, number][] = [
  ['female', 55, 139.7, 34.0, 136, 170, 204, 238, 272],
  ['female', 57, 144.8, 38.6, 154, 193, 232, 270, 309],
  ['female', 59, 149.9, 43.2, 173, 216, 259, 302, 346],
  ['female', 60, 152.4, 45.5, 182, 228, 273, 319, 364],
  ['female', 61, 154.9, 47.8, 191, 239, 287, 335, 382],
  ['female', 62, 157.5, 50.1, 200, 251, 301, 351, 401],
  ['female', 64, 162.6, 54.7, 219, 274, 328, 383, 438],
  ['female', 65, 165.1, 57.0, 228, 285, 342, 399, 456],
  ['female', 67, 170.2, 61.6, 246, 308, 370, 431, 493],
  ['female', 68, 172.7, 63.9, 256, 320, 383, 447, 511],
  ['female', 70, 177.8, 68.5, 274, 343, 411, 480, 548],
  ['female', 72, 182.9, 73.1, 292, 366, 439, 512, 585],
  ['male', 58, 147.3, 45.4, 182, 227, 272, 318, 363],
  ['male', 60, 152.4, 50.0, 200, 250, 300, 350, 400],
  ['male', 62, 157.5, 54.6, 218, 273, 328, 382, 437],
  ['male', 64, 162.6, 59.2, 237, 296, 355, 414, 474],
  ['male', 65, 165.1, 61.5, 246, 308, 369, 431, 492],
  ['male', 66, 167.6, 63.8, 255, 319, 383, 447, 510],
  ['male', 68, 172.7, 68.4, 274, 342, 410, 479, 547],
  ['male', 69, 175.3, 70.7, 283, 354, 424, 495, 566],
  ['male', 70, 177.8, 73.0, 292, 365, 438, 511, 584],
  ['male', 72, 182.9, 77.6, 310, 388, 466, 543, 621],
  ['male', 74, 188.0, 82.2, 329, 411, 493, 575, 658],
  ['male', 76, 193.0, 86.8, 347, 434, 521, 608, 694],
]

describe('predictedBodyWeight', () => {
  // Formula: ARDS Network 2000, doi:10.1056/NEJM200005043421801. The centimetre form may differ from the chart by 0.3 kg.
  it.each(CHART)('agrees with the chart within 0.3 kg: %s, %s in', (sex, inches, cm, kg) => {
    expect(Math.abs(weightOf(sex, cm) - kg)).toBeLessThanOrEqual(0.3)
    expect(Math.abs(weightOf(sex, inches * 2.54) - kg)).toBeLessThanOrEqual(0.3)
  })

  it.each(CHART)('gives the chart’s volumes within 0.3 kg times the mL/kg: %s, %s in', (sex, _inches, cm, _kg, ...volumes) => {
    volumes.forEach((volumeMl, index) => {
      const mlPerKg = index + 4
      expect(Math.abs(weightOf(sex, cm) * mlPerKg - volumeMl)).toBeLessThanOrEqual(0.3 * mlPerKg + 0.5)
    })
  })

  it.each([
    ['male', 175, 70.57, 423],
    ['female', 163, 55.15, 331],
    ['male', 188, 82.4, 494],
    ['female', 150, 43.32, 260],
    ['male', 160, 56.92, 341],
  ] as const)('gives %s of %s cm %s kg and %s mL at 6 mL/kg, derived', (sex, heightCm, kg, volumeMl) => {
    expect(weightOf(sex, heightCm).toFixed(2)).toBe(kg.toFixed(2))
    expect(Math.abs(weightOf(sex, heightCm) * 6 - volumeMl)).toBeLessThanOrEqual(1)
  })

  it('gives a man of 70 inches 73.0 kg and 438 mL at 6 mL/kg, published example', () => {
    expect(weightOf('male', 177.8)).toBeCloseTo(73.1, 1)
    expect(Math.abs(weightOf('male', 177.8) * 6 - 438)).toBeLessThanOrEqual(2)
  })

  it.each([
    [139.9, true],
    [140, false],
    [140.1, false],
  ])('warns below 140 cm: at %s cm outside the range is %s, derived', (heightCm, isOutsideRange) => {
    expect(predictedBodyWeight({ sex: 'female', heightCm, isAdult: true })).toMatchObject({ known: true, isOutsideRange })
  })

  it.each([
    ['no height', { sex: 'male', heightCm: null }, 'missing'],
    ['no sex', { sex: null, heightCm: 170 }, 'missing'],
    ['a height in metres', { sex: 'male', heightCm: 1.7 }, 'implausible'],
    ['a height in inches', { sex: 'male', heightCm: 70 }, 'implausible'],
    ['an impossible height', { sex: 'male', heightCm: 251 }, 'implausible'],
  ] as const)('does not answer with %s', (_case, input, reason) => {
    expect(predictedBodyWeight({ ...input, isAdult: true })).toEqual({ known: false, reason })
  })

  it('is not computed under 18 years or with unknown age', () => {
    expect(predictedBodyWeight({ sex: 'male', heightCm: 170, isAdult: false })).toEqual({ known: false, reason: 'not_adult' })
    expect(predictedBodyWeight({ sex: 'male', heightCm: 170, isAdult: null })).toEqual({ known: false, reason: 'age_unknown' })
  })
})

describe('tidalVolumePerKg', () => {
  const weight = predictedBodyWeight({ sex: 'male', heightCm: 175, isAdult: true })

  it('gives 420 mL in a man of 175 cm as 5.95 mL/kg, derived', () => {
    const answer = tidalVolumePerKg({ tidalVolumeMl: 420, predictedBodyWeight: weight })
    expect(answer.known && answer.value.toFixed(2)).toBe('5.95')
  })

  it('does not answer without a volume, with a volume in litres or without a weight', () => {
    expect(tidalVolumePerKg({ tidalVolumeMl: null, predictedBodyWeight: weight })).toEqual({ known: false, reason: 'missing' })
    expect(tidalVolumePerKg({ tidalVolumeMl: 0.42, predictedBodyWeight: weight })).toEqual({
      known: false,
      reason: 'implausible',
    })
    const noWeight = predictedBodyWeight({ sex: null, heightCm: 170, isAdult: false })
    expect(tidalVolumePerKg({ tidalVolumeMl: 420, predictedBodyWeight: noWeight })).toEqual({ known: false, reason: 'not_adult' })
  })
})
