import { limitText, limitWords } from '@/lib/weaning/limit-words'
import type { Limit, ObservedReading, StopRule } from '@/lib/weaning/protocol'
import { OBSERVED_UNITS, OBSERVED_WORDS, SIGN_WORDS } from '@/lib/weaning/words'

/**
 * A stop or fail rule in plain words.
 * @example describeRule(rule) // 'respiratory rate above 35 /min for 5 min'
 */
export function describeRule(rule: StopRule): string {
  switch (rule.kind) {
    case 'limit':
      return `${limitPhrase(rule.reading, rule.limit)}${lasting(rule.sustainedMin)}`
    case 'change': {
      const size = limitText(rule.by, rule.as === 'percent' ? 0 : decimalsOf(rule.reading))
      const unit = rule.as === 'percent' ? ' %' : spaced(OBSERVED_UNITS[rule.reading])
      const way = rule.direction === 'rise' ? 'up' : 'down'
      const amount = rule.comparator === 'atLeast' ? `${size}${unit} or more` : `more than ${size}${unit}`
      return `${OBSERVED_WORDS[rule.reading]} ${way} ${amount} from baseline${lasting(rule.sustainedMin)}`
    }
    case 'sign':
      return `${SIGN_WORDS[rule.sign]}${lasting(rule.sustainedMin ?? 0)}`
    case 'signs': {
      const limits = rule.limits.map(({ reading, limit }) => limitPhrase(reading, limit))
      return `${rule.atLeast} or more of: ${[...rule.signs.map((sign) => SIGN_WORDS[sign]), ...limits].join(', ')}`
    }
  }
}

function limitPhrase(reading: ObservedReading, limit: Limit): string {
  return `${OBSERVED_WORDS[reading]} ${limitWords(limit, decimalsOf(reading))}${spaced(OBSERVED_UNITS[reading])}`
}

const decimalsOf = (reading: ObservedReading) => (reading === 'ph' ? 2 : 0)
const spaced = (unit: string) => (unit === '' ? '' : ` ${unit}`)
const lasting = (minutes: number) => (minutes > 0 ? ` for ${minutes} min` : '')
