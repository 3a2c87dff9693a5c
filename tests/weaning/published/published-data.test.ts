import { describe, expect, it } from 'vitest'
import type { StopRule } from '@/lib/weaning/protocol'
import { defaultProtocol } from '@/lib/weaning/published/default-protocol'
import { HARD_LIMITS, type LimitedReading } from '@/lib/weaning/published/hard-limits'
import { holdFailGirard2008 } from '@/lib/weaning/published/hold-girard-2008'
import { plausibleReading } from '@/lib/weaning/published/plausible-reading'
import { sourceText } from '@/lib/weaning/published/provenance'
import { rassLevels } from '@/lib/weaning/published/rass-levels'
import { stopBoles2007 } from '@/lib/weaning/published/stop-boles-2007'
import { stopGirard2008 } from '@/lib/weaning/published/stop-girard-2008'
import { suspectUnitSlip } from '@/lib/weaning/published/suspect-unit-slip'
import { describeLimit } from '@/lib/weaning/screen/describe-limit'
import { describeRule } from '@/lib/weaning/stop/describe-rule'
import { HOLD_SAFETY_ITEMS } from '@/lib/weaning/vocabulary'

const readings = Object.keys(HARD_LIMITS) as LimitedReading[]

describe('the default protocol', () => {
  it('screens by the required criteria only', () => {
    const screen = defaultProtocol.screen.map((rule) => `${rule.criterion}: ${describeLimit(rule)}`)
    expect(screen).toEqual([
      'fio2: 0.50 or less',
      'peep: 8 or less',
      'norepinephrine: 0.10 or less',
      'otherVasopressor: none',
      'ischaemia: none',
    ])
  })

  it('stops a trial by the list of Girard 2008 and the circulation limits of Boles 2007', () => {
    expect(defaultProtocol.trial.stopRules.map(describeRule)).toEqual([
      'respiratory rate above 35 /min for 5 min',
      'respiratory rate below 8 /min for 5 min',
      'SpO2 below 88 % for 5 min',
      'abrupt change of mental state',
      'new arrhythmia',
      '2 or more of: accessory muscles in use, abdominal paradox, sweating, marked dyspnoea, heart rate above 130 /min, heart rate below 60 /min',
      'heart rate above 140 /min for 5 min',
      'heart rate up 20 % or more from baseline for 5 min',
      'systolic blood pressure above 180 mmHg for 5 min',
      'systolic blood pressure below 90 mmHg',
    ])
  })

  it('ends a hold by the fail list of Girard 2008 and asks every safety item', () => {
    expect(defaultProtocol.hold.failRules.map(describeRule)).toEqual([
      'anxiety for 5 min',
      'agitation for 5 min',
      'pain for 5 min',
      'respiratory rate above 35 /min for 5 min',
      'SpO2 below 88 % for 5 min',
      'new arrhythmia',
      '2 or more of: accessory muscles in use, abdominal paradox, sweating, marked dyspnoea, heart rate above 130 /min, heart rate below 60 /min',
    ])
    expect(defaultProtocol.hold.safetyItems).toEqual([...HOLD_SAFETY_ITEMS])
  })

  it('keeps its times', () => {
    expect(defaultProtocol.screeningWindow).toEqual({ opensMin: 300, closesMin: 540 })
    expect(defaultProtocol.hold).toMatchObject({
      startWithinMin: 60,
      observeEveryMin: 30,
      toleratedAfterMin: 240,
      restartFraction: 0.5,
    })
    expect(defaultProtocol.trial).toMatchObject({
      defaultDurationMin: 30,
      shortestMin: 30,
      longestMin: 120,
      observationMinutes: [2, 5, 10, 15, 30, 45, 60, 75, 90, 105, 120],
      startWithinMin: 30,
      retryWithinMin: 240,
    })
    expect(defaultProtocol.pairingWindowMin).toBe(120)
    expect(defaultProtocol.decision).toEqual({ answerWithinMin: 60, extubateWithinMin: 120 })
    expect(defaultProtocol.watch.hours).toEqual([1, 6, 12, 24, 48, 72])
  })

  it('names a source beside every rule', () => {
    for (const { source } of [...defaultProtocol.screen, ...defaultProtocol.trial.stopRules, ...defaultProtocol.hold.failRules]) {
      expect(source.length).toBeGreaterThan(10)
    }
  })

  it('gives every rule of a list an id of its own', () => {
    const lists: StopRule[][] = [
      defaultProtocol.trial.stopRules,
      defaultProtocol.hold.failRules,
      ...[stopBoles2007, stopGirard2008, holdFailGirard2008].map(({ rules }) => rules.map(({ rule }) => rule)),
    ]
    for (const rules of lists) expect(new Set(rules.map(({ id }) => id)).size).toBe(rules.length)
  })

  it('survives being kept as JSON', () => {
    expect(JSON.parse(JSON.stringify(defaultProtocol))).toEqual(defaultProtocol)
  })
})

describe('sources', () => {
  it('say when a figure is from memory or from a text that repeats it', () => {
    expect(sourceText('boles2007', 'found')).toBe('Boles 2007, doi:10.1183/09031936.00010206')
    expect(sourceText('girard2008', 'from memory')).toContain('(from memory)')
    expect(sourceText('girard2008', 'secondary')).toContain('(from a text that repeats it)')
  })
})

describe('hard and soft limits', () => {
  it.each(readings)('of %s hold their soft limits inside the hard ones', (reading) => {
    const { hardMin, hardMax, softMin, softMax } = HARD_LIMITS[reading]
    expect([hardMin <= softMin, softMin < softMax, softMax <= hardMax]).toEqual([true, true, true])
  })

  it.each([
    ['fio2Fraction', 0.21, 1],
    ['peepCmH2O', 0, 30],
    ['breathsPerMin', 1, 80],
    ['tidalVolumeMl', 50, 2000],
    ['spo2Percent', 40, 100],
    ['heartRatePerMin', 20, 250],
    ['systolicMmHg', 30, 300],
    ['ph', 6.6, 7.9],
    ['paCO2MmHg', 10, 200],
    ['paO2MmHg', 20, 700],
    ['norepinephrineMcgPerKgMin', 0, 5],
    ['rass', -5, 4],
    ['temperatureC', 25, 45],
    ['haemoglobinGPerDl', 2, 25],
    ['heightCm', 100, 250],
    ['weightKg', 20, 400],
  ] as const)('of %s take %s and %s and refuse what lies beyond (common practice, no source)', (reading, low, high) => {
    expect(plausibleReading(reading, low).known).toBe(true)
    expect(plausibleReading(reading, high).known).toBe(true)
    expect(plausibleReading(reading, low - 0.001)).toEqual({ known: false, reason: 'implausible' })
    expect(plausibleReading(reading, high + 0.001)).toEqual({ known: false, reason: 'implausible' })
    expect(plausibleReading(reading, Number.NaN)).toEqual({ known: false, reason: 'implausible' })
    expect(plausibleReading(reading, null)).toEqual({ known: false, reason: 'missing' })
  })

  it('take a RASS only as a whole number', () => {
    expect(plausibleReading('rass', -1.5)).toEqual({ known: false, reason: 'implausible' })
  })
})

describe('suspectUnitSlip', () => {
  it.each([
    ['fio2Fraction', 50, 'FiO2 is a fraction here: 0.50?'],
    ['fio2Fraction', 21, 'FiO2 is a fraction here: 0.21?'],
    ['paO2FiO2Fraction', 100, 'FiO2 is a fraction here: 1.00?'],
    ['tidalVolumeMl', 0.41, 'Tidal volume is in mL here: 410 mL?'],
    ['setTidalVolumeMl', 0.5, 'Tidal volume is in mL here: 500 mL?'],
    ['paCO2MmHg', 5.3, 'This looks like kPa; it is in mmHg here: 40 mmHg?'],
    ['paO2MmHg', 10.5, 'This looks like kPa; it is in mmHg here: 79 mmHg?'],
    ['haemoglobinGPerDl', 92, 'Haemoglobin is in g/dL here: 9.2 g/dL?'],
    ['temperatureC', 98.6, 'Temperature is in °C here: 37 °C?'],
    ['heightCm', 1.75, 'Height is in cm here: 175 cm?'],
    ['heightCm', 70, 'This looks like inches; height is in cm here: 178 cm?'],
    ['spo2Percent', 0.95, 'SpO2 is in percent here: 95 %?'],
    ['ph', 735, 'The decimal point is missing: 7.35?'],
  ] as const)('asks about %s of %s', (reading, value, expected) => {
    expect(suspectUnitSlip(reading, value)).toBe(expected)
  })

  it('never asks about a value that is possible', () => {
    for (const reading of readings) {
      const { hardMin, hardMax } = HARD_LIMITS[reading]
      for (let step = 0; step <= 200; step += 1)
        expect(suspectUnitSlip(reading, hardMin + ((hardMax - hardMin) * step) / 200)).toBe(null)
    }
  })

  it('proposes only values that are possible', () => {
    for (const reading of readings) {
      for (let value = 0.01; value < 1000; value *= 1.02) {
        const proposed = /(\d[\d.]*)( mL| mmHg| g\/dL| °C| cm| %)?\?$/.exec(suspectUnitSlip(reading, value) ?? '')?.[1]
        if (proposed !== undefined) expect(plausibleReading(reading, Number(proposed)).known).toBe(true)
      }
    }
  })

  it('says nothing where no unit explains the value', () => {
    expect(suspectUnitSlip('fio2Fraction', 5)).toBe(null)
    expect(suspectUnitSlip('heartRatePerMin', 900)).toBe(null)
    expect(suspectUnitSlip('paO2MmHg', -5)).toBe(null)
  })
})

describe('the RASS levels', () => {
  it('are the ten from +4 to -5, Sessler 2002, doi:10.1164/rccm.2107138', () => {
    expect(rassLevels.map(({ level }) => level)).toEqual([4, 3, 2, 1, 0, -1, -2, -3, -4, -5])
  })
})
