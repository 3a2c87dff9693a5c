import type { Limit, ObservedReading, StopRule } from '@/lib/weaning/protocol'
import type { BedsideSign } from '@/lib/weaning/vocabulary'
import { sourceText, type Provenance, type SOURCES } from './provenance'

/** One rule of a published stop list, ready to judge by. */
export type PublishedStopRule = { rule: StopRule; provenance: Provenance }
export type StopList = {
  id: string
  name: string
  source: string
  rules: readonly PublishedStopRule[]
  /** What the list holds and a look at the bedside cannot judge here, in words. */
  notJudged: readonly string[]
}

type Source = keyof typeof SOURCES
type Way = 'rise' | 'fall'

/** Makers of the rules of one published list; each carries its source and where it was read. */
export function stopRuleMakers(source: Source) {
  const cite = (provenance: Provenance) => ({ provenance, text: sourceText(source, provenance) })
  return {
    limit: (
      id: string,
      reading: ObservedReading,
      comparator: Limit['comparator'],
      value: number,
      sustainedMin: number,
      from: Provenance,
    ) => toRule({ kind: 'limit', id, reading, limit: { comparator, value }, sustainedMin, source: cite(from).text }, from),
    change: (
      id: string,
      reading: ObservedReading,
      direction: Way,
      comparator: 'atLeast' | 'above',
      by: number,
      as: 'percent' | 'absolute',
      from: Provenance,
    ) => toRule({ kind: 'change', id, reading, direction, comparator, by, as, sustainedMin: 0, source: cite(from).text }, from),
    sign: (id: string, sign: BedsideSign, from: Provenance) => toRule({ kind: 'sign', id, sign, source: cite(from).text }, from),
    signs: (
      id: string,
      atLeast: number,
      signs: BedsideSign[],
      limits: { reading: ObservedReading; limit: Limit }[],
      from: Provenance,
    ) => toRule({ kind: 'signs', id, atLeast, signs, limits, source: cite(from).text }, from),
  }
}

const toRule = (rule: StopRule, provenance: Provenance): PublishedStopRule => ({ rule, provenance })
