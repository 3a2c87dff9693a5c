import { limitText, limitWords } from '@/lib/weaning/limit-words'
import type { Limit, NumericCriterion, ScreenRule, YesNoCriterion } from '@/lib/weaning/protocol'
import { COUGH_WORDS, SECRETIONS_WORDS } from '@/lib/weaning/words'

/** Decimals in which a criterion's value is shown beside its limit (valueBesideLimit); the comparison never uses them. */
export const CRITERION_DECIMALS: Record<NumericCriterion, number> = {
  fio2: 2,
  peep: 0,
  norepinephrine: 2,
  spo2: 0,
  pfRatio: 0,
  ph: 2,
  rass: 0,
  temperature: 1,
  haemoglobin: 1,
  rsbi: 1,
}

const EXPECTED: Record<YesNoCriterion, { yes: string; no: string }> = {
  otherVasopressor: { yes: 'running', no: 'none' },
  ischaemia: { yes: 'present', no: 'none' },
  spontaneousEffort: { yes: 'present', no: 'absent' },
  raisedIcp: { yes: 'present', no: 'none' },
  neuromuscularBlockade: { yes: 'running', no: 'none' },
  causeImproving: { yes: 'yes', no: 'no' },
}
const WORDS = { ...COUGH_WORDS, ...SECRETIONS_WORDS }

/**
 * What a criterion asks for, in words and without its unit (CRITERION_UNITS).
 * @example describeLimit({ kind: 'number', criterion: 'fio2', limits: [{ comparator: 'atMost', value: 0.5 }], source }) // '0.50 or less'
 */
export function describeLimit(rule: ScreenRule): string {
  switch (rule.kind) {
    case 'number':
      return numberWords(rule.limits, rule.criterion)
    case 'yesNo':
      return EXPECTED[rule.criterion][rule.expect ? 'yes' : 'no']
    case 'word':
      return rule.accept.map((word) => WORDS[word]).join(' or ')
  }
}

function numberWords(limits: Limit[], criterion: NumericCriterion): string {
  const decimals = criterion === 'rsbi' ? 0 : CRITERION_DECIMALS[criterion]
  const low = limits.find(({ comparator }) => comparator === 'atLeast')
  const high = limits.find(({ comparator }) => comparator === 'atMost')
  if (limits.length === 2 && low !== undefined && high !== undefined) {
    return `${signed(low.value, decimals, criterion)} to ${signed(high.value, decimals, criterion)}`
  }
  return limits.map((limit) => limitWords(limit, decimals)).join(' and ')
}

/** RASS levels above zero are read with their sign. */
function signed(value: number, decimals: number, criterion: NumericCriterion): string {
  return criterion === 'rass' && value > 0 ? `+${limitText(value, decimals)}` : limitText(value, decimals)
}
