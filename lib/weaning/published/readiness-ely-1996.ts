import { SOURCES } from './provenance'
import { judged, measured, type ReadinessList } from './readiness-list'

/** Daily screen of Ely 1996. */
export const readinessEly1996: ReadinessList = {
  id: 'ely_1996',
  name: 'Daily screening trial 1996',
  source: SOURCES.ely1996,
  items: [
    judged('cause improving', 'from memory', { criterion: 'causeImproving' }),
    measured('P/F ratio', 'mmHg', 'atLeast', 200, 'from memory', { criterion: 'pfRatio' }),
    measured('PEEP', 'cmH2O', 'atMost', 5, 'from memory', { criterion: 'peep' }),
    measured('RSBI', '/min/L', 'atMost', 105, 'from memory', { criterion: 'rsbi' }),
    measured('dopamine', 'µg/kg/min', 'atMost', 5, 'from memory'),
    judged('no other vasopressor infusion', 'from memory', { criterion: 'otherVasopressor' }),
    judged('no sedative infusion; intermittent doses allowed', 'from memory'),
    judged('adequate cough on suction', 'from memory', { criterion: 'cough' }),
  ],
}
