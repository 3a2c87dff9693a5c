import { SOURCES } from './provenance'
import { judged, measured, type ReadinessList } from './readiness-list'

/** Readiness for a breathing trial by the international consensus conference, Boles 2007, table 5. */
export const readinessBoles2007: ReadinessList = {
  id: 'boles_2007',
  name: 'International consensus conference 2007',
  source: SOURCES.boles2007,
  items: [
    judged('acute phase resolving', 'found', { criterion: 'causeImproving' }),
    measured('SaO2', '%', 'above', 90, 'found', { criterion: 'spo2', either: 'saturation' }),
    measured('FiO2 with that saturation', '', 'atMost', 0.4, 'found', { criterion: 'fio2', either: 'saturation' }),
    measured('P/F ratio', 'mmHg', 'atLeast', 150, 'found', { criterion: 'pfRatio', either: 'ratio' }),
    measured('PEEP', 'cmH2O', 'atMost', 8, 'found', { criterion: 'peep' }),
    measured('respiratory rate', '/min', 'atMost', 35, 'found'),
    measured('tidal volume', 'mL/kg', 'above', 5, 'found'),
    measured('vital capacity', 'mL/kg', 'above', 10, 'found'),
    measured('maximal inspiratory pressure, magnitude', 'cmH2O', 'atLeast', 20, 'found'),
    measured('RSBI', '/min/L', 'below', 105, 'found', { criterion: 'rsbi' }),
    judged('no significant respiratory acidosis', 'found'),
    measured('heart rate', '/min', 'atMost', 140, 'found'),
    measured('systolic blood pressure', 'mmHg', 'atLeast', 90, 'found'),
    measured('systolic blood pressure', 'mmHg', 'atMost', 160, 'found'),
    judged('no or minimal vasopressor', 'found'),
    judged('adequate mental state, without sedation or adequate on it', 'found'),
    judged('adequate cough', 'found', { criterion: 'cough' }),
    judged('no excessive secretions', 'found', { criterion: 'secretions' }),
    judged('stable metabolic state', 'found'),
  ],
}
