import { SOURCES } from './provenance'
import { judged, measured, type ReadinessList } from './readiness-list'

/** Safety screen before a breathing trial in the awakening and breathing controlled trial, Girard 2008. PEEP 7.5 in a later flowchart. */
export const readinessGirard2008: ReadinessList = {
  id: 'girard_2008',
  name: 'Awakening and breathing controlled trial 2008',
  source: SOURCES.girard2008,
  items: [
    measured('SpO2', '%', 'atLeast', 88, 'from memory', { criterion: 'spo2' }),
    measured('FiO2', '', 'atMost', 0.5, 'from memory', { criterion: 'fio2' }),
    measured('PEEP', 'cmH2O', 'atMost', 8, 'from memory', { criterion: 'peep' }),
    judged('any inspiratory effort within 5 min', 'from memory', { criterion: 'spontaneousEffort' }),
    measured('dopamine or dobutamine', 'µg/kg/min', 'below', 5, 'from memory'),
    measured('norepinephrine', 'µg/min', 'below', 2, 'from memory'),
    judged('no vasopressin, no milrinone', 'from memory', { criterion: 'otherVasopressor' }),
    judged('no active myocardial ischaemia in 24 h', 'from memory', { criterion: 'ischaemia' }),
    judged('no agitation', 'from memory'),
    judged('no raised intracranial pressure', 'from memory', { criterion: 'raisedIcp' }),
  ],
}
