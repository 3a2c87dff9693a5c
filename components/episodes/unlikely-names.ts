import { HARD_LIMITS, type LimitedReading } from '@/lib/weaning/published/hard-limits'

/** The readings behind dotted field paths, in words: "readings.spo2Percent" gives "SpO2". */
export function unlikelyNames(paths: readonly string[]): string[] {
  const names = paths.map((path) => path.split('.').at(-1) ?? path)
  return names.map((name) => (name in HARD_LIMITS ? HARD_LIMITS[name as LimitedReading].label.replace(/^the /, '') : name))
}
