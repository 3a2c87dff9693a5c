import { SOURCES } from './provenance'
import { stopRuleMakers, type StopList } from './stop-list'

const { limit, change, sign } = stopRuleMakers('boles2007')

/** Failure of a breathing trial by the international consensus conference, Boles 2007, table 6: any one, no duration given. */
export const stopBoles2007: StopList = {
  id: 'boles_2007',
  name: 'International consensus conference 2007',
  source: SOURCES.boles2007,
  rules: [
    sign('agitation', 'agitation', 'found'),
    sign('anxiety', 'anxiety', 'found'),
    sign('depressed_mental_state', 'depressed_mental_state', 'found'),
    sign('sweating', 'sweating', 'from memory'),
    sign('cyanosis', 'cyanosis', 'from memory'),
    sign('accessory_muscles', 'accessory_muscles', 'from memory'),
    sign('marked_dyspnoea', 'marked_dyspnoea', 'from memory'),
    limit('spo2_low', 'spo2Percent', 'below', 90, 0, 'found'),
    limit('paco2_high', 'paCO2MmHg', 'above', 50, 0, 'found'),
    change('paco2_rise', 'paCO2MmHg', 'rise', 'above', 8, 'absolute', 'found'),
    limit('ph_low', 'ph', 'below', 7.32, 0, 'found'),
    change('ph_fall', 'ph', 'fall', 'atLeast', 0.07, 'absolute', 'found'),
    limit('rsbi_high', 'rsbi', 'above', 105, 0, 'found'),
    limit('breaths_high', 'breathsPerMin', 'above', 35, 0, 'found'),
    change('breaths_rise', 'breathsPerMin', 'rise', 'atLeast', 50, 'percent', 'found'),
    limit('heart_rate_high', 'heartRatePerMin', 'above', 140, 0, 'found'),
    change('heart_rate_rise', 'heartRatePerMin', 'rise', 'atLeast', 20, 'percent', 'found'),
    limit('systolic_high', 'systolicMmHg', 'above', 180, 0, 'found'),
    change('systolic_rise', 'systolicMmHg', 'rise', 'atLeast', 20, 'percent', 'found'),
    limit('systolic_low', 'systolicMmHg', 'below', 90, 0, 'found'),
    sign('new_arrhythmia', 'new_arrhythmia', 'found'),
  ],
  notJudged: [
    'PaO2 of 50 to 60 mmHg or less on FiO2 of 0.50 or more: the FiO2 of the moment is not part of a look',
    'facial distress',
  ],
}
