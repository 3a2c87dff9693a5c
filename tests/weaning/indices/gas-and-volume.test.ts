import { describe, expect, it } from 'vitest'
import { inspiredOxygen } from '@/lib/weaning/indices/inspired-oxygen'
import { isAdult } from '@/lib/weaning/indices/is-adult'
import { minuteVentilation } from '@/lib/weaning/indices/minute-ventilation'
import { norepinephrineMcgPerMin } from '@/lib/weaning/indices/norepinephrine-mcg-per-min'
import { pfRatio } from '@/lib/weaning/indices/pf-ratio'

const valueOf = (answer: { known: true; value: number } | { known: false }) => (answer.known ? answer.value : null)

describe('minuteVentilation', () => {
  const of = (breathsPerMin: number | null, tidalVolumeMl: number | null) =>
    minuteVentilation({ breathsPerMin, tidalVolumeMl, isAdult: true })

  it('gives 18 breaths of 450 mL as 8.10 L/min, R-VE1, by definition', () => {
    expect(valueOf(of(18, 450))?.toFixed(2)).toBe('8.10')
  })
  it('gives 14 breaths of 500 mL as 7.00 L/min, R-VE2, by definition', () => {
    expect(valueOf(of(14, 500))?.toFixed(2)).toBe('7.00')
  })
  it.each([
    [12, 500],
    [14, 450],
    [16, 500],
    [10, 500],
    [12, 420],
  ])('lies between 5 and 8 L/min for an adult at rest, %s breaths of %s mL (common practice, no source)', (rate, volume) => {
    expect(valueOf(of(rate, volume))).toBeGreaterThanOrEqual(5)
    expect(valueOf(of(rate, volume))).toBeLessThanOrEqual(8)
  })
  it('does not answer without rate or volume, with impossible ones, or under 18 years', () => {
    expect(of(null, 450)).toEqual({ known: false, reason: 'missing' })
    expect(of(18, null)).toEqual({ known: false, reason: 'missing' })
    expect(of(18, 0.45)).toEqual({ known: false, reason: 'implausible' })
    expect(minuteVentilation({ breathsPerMin: 18, tidalVolumeMl: 450, isAdult: false })).toEqual({
      known: false,
      reason: 'not_adult',
    })
  })
})

describe('pfRatio', () => {
  const of = (paO2MmHg: number | null, fio2Fraction: number | null) => pfRatio({ paO2MmHg, fio2Fraction, isAdult: true })

  it.each([
    ['R-PF1, published example', 90, 0.4, 225.0],
    ['R-PF2, published example', 80, 0.4, 200.0],
    ['R-PF3, published example', 85, 0.4, 212.5],
    ['R-PF4, derived', 60, 0.6, 100.0],
    ['R-PF5, derived', 70, 0.5, 140.0],
  ])('gives the value of %s', (_source, paO2, fio2, expected) => {
    expect(valueOf(of(paO2, fio2))).toBeCloseTo(expected, 9)
  })
  it.each([
    ['no gas', null, 0.4, 'missing'],
    ['no FiO2', 90, null, 'missing'],
    ['FiO2 typed in percent', 90, 40, 'implausible'],
    ['FiO2 below room air', 90, 0.2, 'implausible'],
    ['a gas in kPa', 12, 0.4, 'implausible'],
  ])('does not answer with %s', (_case, paO2, fio2, reason) => {
    expect(of(paO2, fio2)).toEqual({ known: false, reason })
  })
  it('is not computed under 18 years', () => {
    expect(pfRatio({ paO2MmHg: 90, fio2Fraction: 0.4, isAdult: false })).toEqual({ known: false, reason: 'not_adult' })
  })
})

describe('inspiredOxygen', () => {
  const of = (fio2Fraction: number | null, barometricPressureMmHg: number | null) =>
    inspiredOxygen({ fio2Fraction, barometricPressureMmHg })

  it.each([
    [760, 150],
    [250, 43],
  ])('gives room air at %s mmHg about %s mmHg (common practice, no source)', (pressure, expected) => {
    expect(Math.round(valueOf(of(0.21, pressure)) ?? 0)).toBe(expected)
  })
  it('does not answer without a pressure, or below the pressure of water vapour', () => {
    expect(of(0.21, null)).toEqual({ known: false, reason: 'missing' })
    expect(of(null, 760)).toEqual({ known: false, reason: 'missing' })
    expect(of(0.21, 47)).toEqual({ known: false, reason: 'implausible' })
    expect(of(0.21, 1013)).toEqual({ known: false, reason: 'implausible' })
    expect(of(21, 760)).toEqual({ known: false, reason: 'implausible' })
  })
})

describe('norepinephrineMcgPerMin', () => {
  it.each([
    [0.025, 80, 2.0],
    [0.02, 80, 1.6],
    [0.03, 70, 2.1],
  ])('gives %s µg/kg/min at %s kg as %s µg/min, section 1 boundary table and R-Q4, derived', (dose, kg, expected) => {
    expect(valueOf(norepinephrineMcgPerMin({ mcgPerKgMin: dose, weightKg: kg }))).toBeCloseTo(expected, 9)
  })
  it('does not answer without dose or weight', () => {
    expect(norepinephrineMcgPerMin({ mcgPerKgMin: null, weightKg: 80 })).toEqual({ known: false, reason: 'missing' })
    expect(norepinephrineMcgPerMin({ mcgPerKgMin: 0.1, weightKg: null })).toEqual({ known: false, reason: 'missing' })
    expect(norepinephrineMcgPerMin({ mcgPerKgMin: 8, weightKg: 80 })).toEqual({ known: false, reason: 'implausible' })
  })
})

describe('isAdult', () => {
  it.each([
    [17, false],
    [18, true],
    [19, true],
    [0, false],
    [null, null],
    [-1, null],
    [Number.NaN, null],
    [131, null],
  ])('answers %s years with %s', (age, expected) => {
    expect(isAdult(age)).toBe(expected)
  })
})
