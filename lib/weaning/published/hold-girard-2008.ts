import type { StopRule } from '@/lib/weaning/protocol'
import type { HoldSafetyItem } from '@/lib/weaning/vocabulary'
import { SOURCES, sourceText } from './provenance'
import { stopGirard2008 } from './stop-girard-2008'
import { stopRuleMakers, type StopList } from './stop-list'

const { limit, sign } = stopRuleMakers('girard2008')
/** The publication says "sustained" without a time; five minutes, as for its other limits, is this product's choice. */
const SUSTAINED_MIN = 5
const source = `${sourceText('girard2008', 'secondary')}; "sustained" taken as ${SUSTAINED_MIN} min, no source`

function sustainedSign(id: string, name: 'anxiety' | 'agitation' | 'pain') {
  const rule: StopRule = { kind: 'sign', id, sign: name, sustainedMin: SUSTAINED_MIN, source }
  return { rule, provenance: 'secondary' } as const
}

const distressSigns = stopGirard2008.rules.filter(({ rule }) => rule.kind === 'signs')

/** When a sedation hold has failed (awakening trial), Girard 2008 as a later text repeats it. */
export const holdFailGirard2008: StopList = {
  id: 'girard_2008_hold',
  name: 'Awakening and breathing controlled trial 2008, sedation hold',
  source: SOURCES.girard2008,
  rules: [
    sustainedSign('anxiety', 'anxiety'),
    sustainedSign('agitation', 'agitation'),
    sustainedSign('pain', 'pain'),
    limit('breaths_high', 'breathsPerMin', 'above', 35, 5, 'secondary'),
    limit('spo2_low', 'spo2Percent', 'below', 88, 5, 'secondary'),
    sign('new_arrhythmia', 'new_arrhythmia', 'secondary'),
    ...distressSigns,
  ],
  notJudged: [],
}

/** Reasons not to begin a sedation hold, Girard 2008 as a later text repeats it. */
export const holdSafetyGirard2008: readonly HoldSafetyItem[] = [
  'active_seizures',
  'alcohol_withdrawal',
  'rising_dose_for_agitation',
  'neuromuscular_blockade',
  'ischaemia_24h',
  'raised_icp',
]
