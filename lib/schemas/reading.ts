import { z } from 'zod'
import { HARD_LIMITS, type LimitedReading } from '@/lib/weaning/published/hard-limits'
import { suspectUnitSlip } from '@/lib/weaning/published/suspect-unit-slip'

/** A measured value that must be given, within the hard limits of its kind. The refusal names the limit, and a likely slip of unit. */
export function requiredReading(reading: LimitedReading) {
  const { label } = HARD_LIMITS[reading]
  return z.number({ error: `Give ${label}, as a number.` }).superRefine(checkLimits(reading))
}

/** The same, but it may be left out; what is left out is stored as not assessed. */
export function optionalReading(reading: LimitedReading) {
  return z
    .number({ error: `Give ${HARD_LIMITS[reading].label} as a number, or leave it empty.` })
    .superRefine(checkLimits(reading))
    .nullable()
}

function checkLimits(reading: LimitedReading) {
  const { label, unit, hardMin, hardMax, isWhole } = HARD_LIMITS[reading]
  return (value: number, issues: z.RefinementCtx) => {
    const slip = suspectUnitSlip(reading, value)
    if (slip !== null) issues.addIssue({ code: 'custom', message: slip })
    else if (value < hardMin || value > hardMax) {
      issues.addIssue({
        code: 'custom',
        message: `${value} is not possible: ${label} is between ${hardMin} and ${hardMax} ${unit}.`.replace(' .', '.'),
      })
    } else if (isWhole && !Number.isInteger(value))
      issues.addIssue({ code: 'custom', message: `Give ${label} as a whole number.` })
  }
}

/** Whether a value is possible but outside what is usual for its kind: kept, but only after a second look, and marked. */
export function isUnlikely(reading: LimitedReading, value: number): boolean {
  const { hardMin, hardMax, softMin, softMax } = HARD_LIMITS[reading]
  return value >= hardMin && value <= hardMax && (value < softMin || value > softMax)
}

/** "52 /min is unusual for the respiratory rate. Look again, then confirm." */
export function secondLookMessage(reading: LimitedReading, value: number): string {
  const { label, unit } = HARD_LIMITS[reading]
  const shown = unit === '' || unit === 'as a fraction' ? `${value}` : `${value} ${unit}`
  return `${shown} is unusual for ${label}. Look again, then confirm.`
}

/** Where an entry keeps readings: at its top, or under one of these. */
const NESTED = ['readings', 'baseline'] as const

/**
 * The fields of an input or a row whose values are unlikely, as dotted paths ("peepCmH2O", "readings.spo2Percent").
 * Looks at every field named like a reading, at the top and under `readings` and `baseline`.
 */
export function listUnlikely(values: object): string[] {
  return unlikelyFields(values).map(({ path }) => path.join('.'))
}

/**
 * For `.superRefine(askSecondLook)` on the schema of an entry: an unlikely value passes only when `confirmedUnlikely` names its field
 * (the dotted path, as in listUnlikely). Otherwise the refusal stands at the field and asks for a second look.
 */
export function askSecondLook(input: object & { confirmedUnlikely?: string[] | undefined }, issues: z.RefinementCtx): void {
  const confirmed = input.confirmedUnlikely ?? []
  for (const { path, reading, value } of unlikelyFields(input)) {
    if (!confirmed.includes(path.join('.'))) issues.addIssue({ code: 'custom', path, message: secondLookMessage(reading, value) })
  }
}

function unlikelyFields(values: object): { path: string[]; reading: LimitedReading; value: number }[] {
  const own = unlikelyAt(values, [])
  const nested = NESTED.flatMap((name) => {
    const inner: unknown = Reflect.get(values, name)
    return typeof inner === 'object' && inner !== null ? unlikelyAt(inner, [name]) : []
  })
  return [...own, ...nested]
}

function unlikelyAt(values: object, path: string[]): { path: string[]; reading: LimitedReading; value: number }[] {
  return Object.entries(values).flatMap(([name, value]: [string, unknown]) =>
    typeof value === 'number' && isLimitedReading(name) && isUnlikely(name, value)
      ? [{ path: [...path, name], reading: name, value }]
      : [],
  )
}

function isLimitedReading(name: string): name is LimitedReading {
  return Object.hasOwn(HARD_LIMITS, name)
}
