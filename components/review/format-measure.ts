import type { MeasureColumn } from '@/lib/weaning/course/measure-table'

export const NOT_COMPUTABLE = 'not computable'

/** A value as it is read: "250", "91.3 %", "0.52"; never 0 for what cannot be computed. */
export function formatValue(kind: MeasureColumn['kind'], value: number | null): string {
  if (value === null) return NOT_COMPUTABLE
  if (kind === 'percent') return `${(value * 100).toFixed(1)} %`
  return kind === 'ratio' ? value.toFixed(2) : String(value)
}
