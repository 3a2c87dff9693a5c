import type { ScreenRule } from '@/lib/weaning/protocol'
import { defaultProtocol } from '@/lib/weaning/published/default-protocol'
import { SCREEN_CRITERIA, type ScreenCriterion } from '@/lib/weaning/vocabulary'

const boles = 'Boles 2007, doi:10.1183/09031936.00010206'
const practice = 'unit practice'

const FURTHER: ScreenRule[] = [
  { kind: 'number', criterion: 'spo2', limits: [{ comparator: 'atLeast', value: 90 }], source: practice },
  { kind: 'number', criterion: 'pfRatio', limits: [{ comparator: 'atLeast', value: 150 }], source: boles },
  {
    kind: 'number',
    criterion: 'ph',
    limits: [{ comparator: 'above', value: 7.25 }],
    source: 'MacIntyre 2001 in a later adaptation, doi:10.1378/chest.120.6_suppl.375S',
  },
  { kind: 'yesNo', criterion: 'spontaneousEffort', expect: true, source: practice },
  { kind: 'word', criterion: 'cough', accept: ['strong'], source: boles },
  { kind: 'word', criterion: 'secretions', accept: ['scant', 'moderate'], source: boles },
  {
    kind: 'number',
    criterion: 'rass',
    limits: [
      { comparator: 'atLeast', value: -2 },
      { comparator: 'atMost', value: 1 },
    ],
    source: practice,
  },
  { kind: 'yesNo', criterion: 'raisedIcp', expect: false, source: practice },
  { kind: 'yesNo', criterion: 'neuromuscularBlockade', expect: false, source: practice },
  { kind: 'number', criterion: 'temperature', limits: [{ comparator: 'atMost', value: 38.5 }], source: practice },
  { kind: 'number', criterion: 'haemoglobin', limits: [{ comparator: 'atLeast', value: 7 }], source: practice },
  { kind: 'yesNo', criterion: 'causeImproving', expect: true, source: boles },
  {
    kind: 'number',
    criterion: 'rsbi',
    limits: [{ comparator: 'atMost', value: 105 }],
    source: 'Yang & Tobin 1991, doi:10.1056/NEJM199105233242101',
  },
]

/** What a criterion starts from when it is switched on; the unit then sets its own limit and source. */
export const CRITERION_TEMPLATES: ScreenRule[] = [...defaultProtocol.screen, ...FURTHER].sort(
  (a, b) => SCREEN_CRITERIA.indexOf(a.criterion) - SCREEN_CRITERIA.indexOf(b.criterion),
)

/** FiO2 and PEEP cannot be switched off. */
export const FIXED_CRITERIA: readonly ScreenCriterion[] = ['fio2', 'peep']
