import { z } from 'zod'
import type {
  Comparator,
  Limit,
  NumericCriterion,
  ObservedReading,
  ProtocolContent,
  ScreenRule,
  StopRule,
  YesNoCriterion,
} from '@/lib/weaning/protocol'
import { COUGHS, SECRETIONS } from '@/lib/weaning/vocabulary'

type Range = { from: number; to: number }
type Refuse = (path: (string | number)[], message: string) => void
const isUpper = (comparator: Comparator) => comparator === 'atMost' || comparator === 'below'

/** How far a readiness limit may go: a ceiling (at most, below) and a floor (at least, above); an absent one makes no sense for the criterion. */
const SCREEN_RANGES: Record<NumericCriterion, { label: string; ceiling?: Range; floor?: Range }> = {
  fio2: { label: 'FiO2', ceiling: { from: 0.3, to: 0.6 } },
  peep: { label: 'PEEP', ceiling: { from: 5, to: 10 } },
  norepinephrine: { label: 'Norepinephrine', ceiling: { from: 0, to: 0.2 } },
  spo2: { label: 'SpO2', floor: { from: 85, to: 96 } },
  pfRatio: { label: 'P/F', floor: { from: 100, to: 300 } },
  ph: { label: 'pH', ceiling: { from: 7.45, to: 7.6 }, floor: { from: 7.2, to: 7.4 } },
  rass: { label: 'RASS', ceiling: { from: 0, to: 2 }, floor: { from: -4, to: 0 } },
  temperature: { label: 'Temperature', ceiling: { from: 37.5, to: 39.5 }, floor: { from: 34, to: 36.5 } },
  haemoglobin: { label: 'Haemoglobin', floor: { from: 6, to: 10 } },
  rsbi: { label: 'RSBI', ceiling: { from: 60, to: 120 } },
}
/** The answer that can speak for readiness; the opposite would pass exactly the patients who must not. */
const EXPECTED: Record<YesNoCriterion, boolean> = {
  otherVasopressor: false,
  ischaemia: false,
  raisedIcp: false,
  neuromuscularBlockade: false,
  spontaneousEffort: true,
  causeImproving: true,
}
/** How far a stop limit may go: beyond a high (above, at least) or a low (below, at most) limit a patient is in trouble. */
const STOP_RANGES: Record<ObservedReading, { label: string; high?: Range; low?: Range }> = {
  breathsPerMin: { label: 'The respiratory rate', high: { from: 25, to: 40 }, low: { from: 4, to: 12 } },
  tidalVolumeMl: { label: 'The tidal volume', low: { from: 150, to: 400 } },
  rsbi: { label: 'The RSBI', high: { from: 80, to: 130 } },
  spo2Percent: { label: 'The SpO2', low: { from: 85, to: 94 } },
  heartRatePerMin: { label: 'The heart rate', high: { from: 100, to: 150 }, low: { from: 40, to: 70 } },
  systolicMmHg: { label: 'The systolic blood pressure', high: { from: 140, to: 200 }, low: { from: 80, to: 110 } },
  paCO2MmHg: { label: 'The PaCO2', high: { from: 45, to: 80 }, low: { from: 20, to: 35 } },
  paO2MmHg: { label: 'The PaO2', low: { from: 50, to: 70 } },
  ph: { label: 'The pH', high: { from: 7.45, to: 7.6 }, low: { from: 7.2, to: 7.36 } },
}
/** The largest change from baseline that may still pass as a rule, in the reading's own unit; percent has its own range. */
const LARGEST_CHANGE: Record<ObservedReading, number> = {
  breathsPerMin: 20,
  tidalVolumeMl: 300,
  rsbi: 60,
  spo2Percent: 10,
  heartRatePerMin: 50,
  systolicMmHg: 60,
  paCO2MmHg: 20,
  paO2MmHg: 40,
  ph: 0.15,
}
const LONGEST_SUSTAINED_MIN = 15

/** Refuses, each at its field, a protocol that contradicts itself or would wave through or keep going where no unit should. */
export function checkProtocolSense(content: ProtocolContent, issues: z.RefinementCtx): void {
  const refuse: Refuse = (path, message) => issues.addIssue({ code: 'custom', path, message })
  const { screeningWindow, watch } = content
  if (screeningWindow.closesMin <= screeningWindow.opensMin)
    refuse(['screeningWindow', 'closesMin'], 'The window closes after it opens, on the same day.')
  checkScreen(content.screen, refuse)
  checkHold(content, refuse)
  checkTrial(content, refuse)
  if (!isRising(watch.hours)) refuse(['watch', 'hours'], 'Give the hours in rising order, each once.')
}

function checkScreen(rules: ScreenRule[], refuse: Refuse): void {
  const seen = new Set<string>()
  rules.forEach((rule, index) => {
    const path = ['screen', index]
    if (seen.has(rule.criterion)) refuse([...path, 'criterion'], 'This criterion stands twice. Keep one.')
    seen.add(rule.criterion)
    if (rule.kind === 'number') checkScreenLimits(rule.criterion, rule.limits, path, refuse)
    if (rule.kind === 'yesNo' && rule.expect !== EXPECTED[rule.criterion]) {
      refuse([...path, 'expect'], `A patient is ready only when this is answered “${EXPECTED[rule.criterion] ? 'yes' : 'no'}”.`)
    }
    if (rule.kind === 'word') checkWords(rule, path, refuse)
  })
  for (const needed of ['fio2', 'peep'] as const) {
    if (!seen.has(needed))
      refuse(['screen'], `${SCREEN_RANGES[needed].label} stays on the list: a screen without it is not safe.`)
  }
}

function checkScreenLimits(criterion: NumericCriterion, limits: Limit[], path: (string | number)[], refuse: Refuse): void {
  const { label, ceiling, floor } = SCREEN_RANGES[criterion]
  limits.forEach((limit, index) => {
    const range = isUpper(limit.comparator) ? ceiling : floor
    const at = [...path, 'limits', index]
    if (!range)
      refuse(
        [...at, 'comparator'],
        `${label} is limited ${ceiling ? 'from above: at most, or below' : 'from below: at least, or above'}.`,
      )
    else refuseOutside(label, limit.value, range, [...at, 'value'], refuse)
  })
  const [first, second] = limits
  if (first && second && isUpper(first.comparator) === isUpper(second.comparator)) {
    refuse([...path, 'limits', 1, 'comparator'], 'Two limits are one from above and one from below.')
  }
}

function checkWords(rule: Extract<ScreenRule, { kind: 'word' }>, path: (string | number)[], refuse: Refuse): void {
  const words: readonly string[] = rule.criterion === 'cough' ? COUGHS : SECRETIONS
  const accepted: readonly string[] = rule.accept
  const [best = '', , worst = ''] = words
  if (accepted.some((word) => !words.includes(word))) refuse([...path, 'accept'], `Choose among ${words.join(', ')}.`)
  else if (!accepted.includes(best)) refuse([...path, 'accept'], `“${best}” is always accepted.`)
  else if (accepted.includes(worst)) refuse([...path, 'accept'], `“${worst}” cannot count as ready.`)
}

function checkHold({ hold }: ProtocolContent, refuse: Refuse): void {
  checkStopRules(hold.failRules, ['hold', 'failRules'], refuse)
  hold.failRules.forEach((rule, index) => {
    if (rule.kind === 'change')
      refuse(['hold', 'failRules', index, 'kind'], 'A hold has no baseline to compare with. Give a fixed limit.')
  })
  if (!hold.safetyItems.includes('neuromuscular_blockade')) {
    refuse(['hold', 'safetyItems'], 'Neuromuscular blockade stays on the list: nobody is woken while paralysed.')
  }
  if (new Set(hold.safetyItems).size !== hold.safetyItems.length) refuse(['hold', 'safetyItems'], 'A safety item stands twice.')
  if (hold.observeEveryMin > hold.toleratedAfterMin)
    refuse(['hold', 'observeEveryMin'], 'Observe at least once before the hold counts as tolerated.')
}

function checkTrial({ trial }: ProtocolContent, refuse: Refuse): void {
  checkStopRules(trial.stopRules, ['trial', 'stopRules'], refuse)
  if (trial.longestMin < trial.shortestMin) refuse(['trial', 'longestMin'], 'The longest length is not below the shortest.')
  if (trial.defaultDurationMin < trial.shortestMin || trial.defaultDurationMin > trial.longestMin) {
    refuse(['trial', 'defaultDurationMin'], `The usual length lies between ${trial.shortestMin} and ${trial.longestMin} min.`)
  }
  const looks = trial.observationMinutes
  if (!isRising(looks)) refuse(['trial', 'observationMinutes'], 'Give the minutes in rising order, each once.')
  else if ((looks[0] ?? 0) > 5) refuse(['trial', 'observationMinutes'], 'The first look is within 5 minutes of the start.')
  else if ([...looks, trial.longestMin].some((minute, index) => minute - (looks[index - 1] ?? 0) > 30)) {
    refuse(['trial', 'observationMinutes'], 'No more than 30 minutes pass between two looks, up to the longest length.')
  }
}

function checkStopRules(rules: StopRule[], path: (string | number)[], refuse: Refuse): void {
  const seen = new Set<string>()
  rules.forEach((rule, index) => {
    const at = [...path, index]
    if (seen.has(rule.id)) refuse([...at, 'id'], 'This rule stands twice. Keep one.')
    seen.add(rule.id)
    if (rule.kind === 'limit') checkStopLimit(rule.reading, rule.limit, at, refuse)
    if (rule.kind === 'change') checkChange(rule, at, refuse)
    if (rule.kind !== 'signs' && (rule.sustainedMin ?? 0) > LONGEST_SUSTAINED_MIN) {
      refuse([...at, 'sustainedMin'], `A limit may be exceeded for at most ${LONGEST_SUSTAINED_MIN} min before it counts.`)
    }
    if (rule.kind === 'signs' && rule.atLeast > rule.signs.length + rule.limits.length)
      refuse([...at, 'atLeast'], 'More signs are asked for than are listed.')
    if (rule.kind === 'signs')
      rule.limits.forEach((each, place) => checkStopLimit(each.reading, each.limit, [...at, 'limits', place], refuse))
  })
  const guards = (reading: ObservedReading, isLow: boolean) =>
    rules.some((rule) => rule.kind === 'limit' && rule.reading === reading && isUpper(rule.limit.comparator) === isLow)
  if (!guards('breathsPerMin', false)) refuse(path, 'Keep a limit for a high respiratory rate.')
  if (!guards('spo2Percent', true)) refuse(path, 'Keep a limit for a low SpO2.')
}

function checkChange(rule: Extract<StopRule, { kind: 'change' }>, path: (string | number)[], refuse: Refuse): void {
  if (rule.as === 'percent') {
    if (rule.by < 5 || rule.by > 50) refuse([...path, 'by'], 'A change in percent is between 5 and 50 %.')
    return
  }
  const largest = LARGEST_CHANGE[rule.reading]
  if (rule.by > largest)
    refuse([...path, 'by'], `${STOP_RANGES[rule.reading].label}: a change of at most ${largest} may count as a rule.`)
}

function checkStopLimit(reading: ObservedReading, limit: Limit, path: (string | number)[], refuse: Refuse): void {
  const { label, high, low } = STOP_RANGES[reading]
  const range = isUpper(limit.comparator) ? low : high
  if (!range)
    refuse([...path, 'limit', 'comparator'], `${label} is watched ${high ? 'for being above' : 'for being below'} a limit.`)
  else refuseOutside(label, limit.value, range, [...path, 'limit', 'value'], refuse)
}

function refuseOutside(label: string, value: number, { from, to }: Range, path: (string | number)[], refuse: Refuse): void {
  if (value < from || value > to)
    refuse(path, `${label}: a limit of ${value} is outside what a protocol may hold here, ${from} to ${to}.`)
}

const isRising = (values: number[]) => values.every((value, index) => value > (values[index - 1] ?? Number.NEGATIVE_INFINITY))
