import { SOURCES } from './provenance'
import { stopRuleMakers, type StopList } from './stop-list'

const { limit, sign, signs } = stopRuleMakers('girard2008')

/** When to stop a breathing trial in the awakening and breathing controlled trial, Girard 2008. */
export const stopGirard2008: StopList = {
  id: 'girard_2008',
  name: 'Awakening and breathing controlled trial 2008',
  source: SOURCES.girard2008,
  rules: [
    limit('breaths_high', 'breathsPerMin', 'above', 35, 5, 'from memory'),
    limit('breaths_low', 'breathsPerMin', 'below', 8, 5, 'from memory'),
    limit('spo2_low', 'spo2Percent', 'below', 88, 5, 'from memory'),
    sign('abrupt_mental_change', 'abrupt_mental_change', 'from memory'),
    sign('new_arrhythmia', 'new_arrhythmia', 'from memory'),
    signs(
      'distress_signs',
      2,
      ['accessory_muscles', 'abdominal_paradox', 'sweating', 'marked_dyspnoea'],
      [
        { reading: 'heartRatePerMin', limit: { comparator: 'above', value: 130 } },
        { reading: 'heartRatePerMin', limit: { comparator: 'below', value: 60 } },
      ],
      'from memory',
    ),
  ],
  notJudged: [],
}
