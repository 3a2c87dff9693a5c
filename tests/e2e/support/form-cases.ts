import type { Locator, Page } from '@playwright/test'
import { choose, field, fill, observedAgo } from './forms'
import { PASSWORD, type Ward, type Who } from './places'

/** A form and what is done to it: sent empty, with wrong units, twice, late, and by somebody whose role may not. */
export type FormCase = {
  what: string
  who: Who
  path: (ward: Ward) => string
  /** Brings the form up, where a page does not show it at once. */
  open?: (page: Page) => Promise<void>
  form: string | RegExp
  submit: string
  /** What is said when nothing was filled in. */
  empty?: string | RegExp
  /** Brings an empty state about, where the page fills in what it knows. */
  clear?: (form: Locator) => Promise<void>
  /** Typed values that must be refused, each with the words at its field. */
  wrong?: { label: string; typed: string; words: RegExp }[]
  fillRight: (form: Locator, ward: Ward) => Promise<void>
  /** An entry that was observed a while ago: when, and what stands on the patient's page. */
  late?: { legend: string; minutes: number; entry: RegExp; patient: (ward: Ward) => string }
  /** Rows of the record, before and after. */
  count: { sql: string; values: (ward: Ward) => unknown[] }
  /** Somebody of the unit whose role may not, and how the page says so; the page may also not exist for them. */
  wrongRole: { who: Who; seen: RegExp }
  /** Somebody of another unit may send this: what is asked for is in a unit of theirs. */
  mayStranger?: boolean
}

const patientOf = (key: keyof Ward['patients']) => (ward: Ward) => ward.patients[key].patientId
const inEpisode = (key: keyof Ward['patients'], step: string) => (ward: Ward) =>
  `/episodes/${ward.patients[key].episodeId}/${step}`
const rowsOfEpisode = (table: string, key: keyof Ward['patients']) => ({
  sql: `select count(*) as n from ${table} where episode_id = ?`,
  values: (ward: Ward) => [ward.patients[key].episodeId],
})
const FIO2_PERCENT = { label: 'FiO2', typed: '50', words: /FiO2 is a fraction here: 0\.50\?/ }
const readOnly = (who: Who) => ({ who, seen: /To read only/ })

const allNo = async (form: Locator) => {
  const safety = form.getByRole('group', { name: /^Safety screen/ }).getByRole('radiogroup')
  for (const item of await safety.all()) await item.getByRole('radio', { name: 'no', exact: true }).check()
}
const click = (name: string) => (page: Page) => page.getByRole('button', { name, exact: true }).click()

export const CLINICAL_FORMS: FormCase[] = [
  {
    what: 'ventilator settings',
    who: 'nurse',
    path: inEpisode('values', 'settings'),
    form: 'Ventilator settings',
    submit: 'Record',
    empty: 'Choose the mode.',
    wrong: [
      FIO2_PERCENT,
      { label: 'Measured tidal volume', typed: '0.41', words: /Tidal volume is in mL here: 410 mL\?/ },
      { label: 'SpO2', typed: '0.95', words: /SpO2 is in percent here: 95 %\?/ },
      { label: 'PEEP', typed: '31', words: /between 0 and 30 cmH2O/ },
    ],
    fillRight: async (form) => {
      await form.getByRole('combobox', { name: 'Mode' }).selectOption('PC-CSV')
      await fill(form, { FiO2: '0.45', PEEP: '6', 'Pressure support': '9', 'Measured tidal volume': '410', SpO2: '95' })
    },
    late: { legend: 'Observed at', minutes: 60, entry: /^.*Settings/, patient: patientOf('values') },
    count: rowsOfEpisode('settings', 'values'),
    wrongRole: readOnly('lead'),
  },
  {
    what: 'an arterial blood gas',
    who: 'rt',
    path: inEpisode('values', 'gases'),
    form: 'Blood gas',
    submit: 'Record',
    empty: 'Give the pH, as a number.',
    wrong: [
      { label: 'PaCO2', typed: '5.3', words: /looks like kPa; it is in mmHg here: 40 mmHg\?/ },
      { label: 'PaO2', typed: '11', words: /looks like kPa; it is in mmHg here: 83 mmHg\?/ },
      { label: 'FiO2 when drawn', typed: '50', words: /FiO2 is a fraction here: 0\.50\?/ },
      { label: 'pH', typed: '738', words: /decimal point is missing: 7\.38\?/ },
      { label: 'Haemoglobin', typed: '98', words: /9\.8 g\/dL\?/ },
    ],
    fillRight: (form) => fill(form, { pH: '7.38', PaCO2: '41', PaO2: '79', 'FiO2 when drawn': '0.40', Haemoglobin: '9.8' }),
    late: { legend: 'Observed at', minutes: 60, entry: /Blood gas/, patient: patientOf('values') },
    count: rowsOfEpisode('gases', 'values'),
    wrongRole: readOnly('lead'),
  },
  {
    what: 'the daily screen',
    who: 'rt',
    path: inEpisode('screen', 'screen'),
    form: 'Daily screen',
    submit: 'Record screen',
    clear: async (form) => {
      for (const label of ['FiO2', 'PEEP']) await field(form, label).fill('')
    },
    empty: 'Give at least one reading',
    wrong: [FIO2_PERCENT, { label: 'Tidal volume, spontaneous', typed: '0.41', words: /410 mL\?/ }],
    fillRight: async (form) => {
      await fill(form, { FiO2: '0.60', PEEP: '5', 'Norepinephrine dose, 0 when none runs': '0', 'Tidal volume, spontaneous': '' })
      await choose(form, 'Other vasopressor', 'no')
      await choose(form, 'Active ischaemia in 24 h', 'no')
    },
    late: { legend: 'Observed at', minutes: 60, entry: /Screen: not ready/, patient: patientOf('screen') },
    count: rowsOfEpisode('screens', 'screen'),
    wrongRole: readOnly('nurse'),
  },
  {
    what: 'an excuse from the screen',
    who: 'physician',
    path: inEpisode('excuse', 'screen'),
    open: click('Excuse from the screen today'),
    form: 'Daily screen',
    submit: 'Record as excused today',
    empty: 'Choose why there is no screen today.',
    fillRight: async (form) => {
      await choose(form, 'Why there is no screen today', 'Another reason')
      await field(form, 'Note').fill('Bronchoscopy at eight')
    },
    late: { legend: 'Observed at', minutes: 60, entry: /Screen: excused/, patient: patientOf('excuse') },
    count: rowsOfEpisode('screens', 'excuse'),
    wrongRole: readOnly('nurse'),
  },
  {
    what: 'the start of a sedation hold',
    who: 'nurse',
    path: inEpisode('holdStart', 'hold'),
    open: (page) => page.getByRole('radio', { name: 'Continuous sedation is running' }).check(),
    form: 'Sedation hold',
    submit: 'Start the hold',
    empty: /safety|Answer|infusion/i,
    fillRight: async (form) => {
      await allNo(form)
      await form.getByRole('button', { name: 'Add an infusion' }).click()
      await fill(form, { Drug: 'propofol', Rate: '30' })
      await form.getByRole('combobox', { name: 'Unit' }).selectOption('mL/h')
      await choose(form, 'Given', /for sedation/)
    },
    late: { legend: 'Hold starts at', minutes: 45, entry: /Sedation hold started/, patient: patientOf('holdStart') },
    count: rowsOfEpisode('holds', 'holdStart'),
    wrongRole: readOnly('rt'),
  },
  {
    what: 'an observation during a hold',
    who: 'rt',
    path: inEpisode('onHold', 'hold'),
    form: 'Observation during the hold',
    submit: 'Record observation',
    empty: /Give at least one/,
    wrong: [
      { label: 'SpO2', typed: '0.94', words: /94 %\?/ },
      { label: 'Respiratory rate', typed: 'fast', words: /Write a number in digits/ },
    ],
    fillRight: async (form) => {
      await choose(form, 'Opens eyes to voice', 'yes')
      await fill(form, { SpO2: '94', 'Respiratory rate': '22' })
    },
    late: { legend: 'Observed at', minutes: 40, entry: /Observation during the hold/, patient: patientOf('onHold') },
    count: rowsOfEpisode('hold_observations', 'onHold'),
    wrongRole: { who: 'lead', seen: /Sedation hold/ },
  },
  {
    what: 'the end of a hold',
    who: 'nurse',
    path: inEpisode('onHold', 'hold'),
    open: click('Stopped for another reason'),
    form: 'End of the hold',
    submit: 'Record the end',
    empty: /why|stopped/i,
    fillRight: (form) => field(form, 'Why it was stopped').fill('Taken to a procedure'),
    late: { legend: 'Ended at', minutes: 35, entry: /Hold ended: stopped/, patient: patientOf('onHold') },
    count: rowsOfEpisode('hold_ends', 'onHold'),
    wrongRole: { who: 'lead', seen: /Sedation hold/ },
  },
  {
    what: 'the start of a breathing trial',
    who: 'rt',
    path: inEpisode('trialStart', 'trial'),
    form: 'Start of the breathing trial',
    submit: 'Start the trial',
    empty: /Carried over: confirm it|Choose the technique/,
    wrong: [FIO2_PERCENT, { label: 'Tidal volume', typed: '0.41', words: /410 mL\?/ }],
    fillRight: async (form) => {
      await choose(form, 'Technique', 'T-piece')
      await fill(form, {
        FiO2: '0.40',
        'Planned length': '30',
        'Respiratory rate': '20',
        'Tidal volume': '410',
        SpO2: '96',
        'Heart rate': '88',
      })
    },
    late: { legend: 'Trial starts at', minutes: 50, entry: /Breathing trial started/, patient: patientOf('trialStart') },
    count: rowsOfEpisode('trials', 'trialStart'),
    wrongRole: readOnly('nurse'),
  },
  {
    what: 'an observation during a trial',
    who: 'nurse',
    path: inEpisode('onTrial', 'trial'),
    open: async (page) => page.getByText('Blood gas of this moment').click(),
    form: 'Observation during the trial',
    submit: 'Record observation',
    empty: /Give at least one/,
    wrong: [
      { label: 'Tidal volume', typed: '0.38', words: /380 mL\?/ },
      { label: 'PaCO2', typed: '5.3', words: /looks like kPa/ },
    ],
    fillRight: (form) => fill(form, { 'Respiratory rate': '22', 'Tidal volume': '380', PaCO2: '' }),
    late: { legend: 'Observed at', minutes: 34, entry: /Observation during the trial/, patient: patientOf('onTrial') },
    count: rowsOfEpisode('trial_observations', 'onTrial'),
    wrongRole: { who: 'lead', seen: /Breathing trial/ },
  },
  {
    what: 'the end of a trial',
    who: 'rt',
    path: inEpisode('onTrial', 'trial'),
    open: click('Stopped for another reason'),
    form: 'End of the trial',
    submit: 'Record the end',
    empty: /Say what the patient went back to/,
    fillRight: (form) => fill(form, { 'Why it was stopped': 'Taken to a procedure', 'Returned to': 'PC-CSV as before' }),
    late: { legend: 'Ended at', minutes: 33, entry: /stopped/i, patient: patientOf('onTrial') },
    count: rowsOfEpisode('trial_ends', 'onTrial'),
    wrongRole: { who: 'lead', seen: /Breathing trial/ },
  },
  {
    what: 'a signed decision',
    who: 'physician',
    path: inEpisode('decision', 'decision'),
    form: 'Decision',
    submit: 'Sign the decision',
    empty: 'Choose a decision.',
    fillRight: async (form) => {
      await choose(form, 'What do you decide?', 'Not today')
      await form.getByRole('checkbox', { name: 'Secretions' }).check()
      await form.getByRole('combobox', { name: 'Day to look again' }).selectOption({ index: 1 })
      await form.getByRole('textbox', { name: 'Time to look again, 24-hour clock' }).fill('06:30')
      await form.getByLabel('Your password, to sign', { exact: true }).fill(PASSWORD)
    },
    count: rowsOfEpisode('decisions', 'decision'),
    wrongRole: readOnly('rt'),
  },
  {
    what: 'an airway event',
    who: 'physician',
    path: inEpisode('values', 'airway'),
    form: 'Airway event',
    submit: 'Record',
    empty: 'Choose what happened.',
    fillRight: (form) => choose(form, 'What happened', 'Tracheostomy placed'),
    late: { legend: 'Observed at', minutes: 60, entry: /Tracheostomy placed/, patient: patientOf('values') },
    count: rowsOfEpisode('airway_events', 'values'),
    wrongRole: readOnly('lead'),
  },
  {
    what: 'the end of ventilation',
    who: 'nurse',
    path: inEpisode('end', 'end'),
    form: 'End ventilation',
    submit: 'Record the end of ventilation',
    empty: 'Choose how ventilation ended.',
    fillRight: async (form) => {
      await choose(form, 'How it ended', 'Self-extubated')
      await choose(form, 'Support afterwards', 'High flow')
      await field(form, 'Remark (may stay empty)').fill('Pulled during turning')
    },
    late: { legend: 'Ended at', minutes: 60, entry: /Self-extubated/, patient: patientOf('end') },
    count: rowsOfEpisode('airway_events', 'end'),
    wrongRole: readOnly('lead'),
  },
]

const inUnit = (page: string) => (ward: Ward) => `/units/${ward.unitId}/${page}`
const ofPatient = (key: keyof Ward['patients'], page: string) => (ward: Ward) =>
  `/patients/${ward.patients[key].patientId}/${page}`
const rowsOfPatient = (table: string, key: keyof Ward['patients']) => ({
  sql: `select count(*) as n from ${table} where patient_id = ?`,
  values: (ward: Ward) => [ward.patients[key].patientId],
})
const auditRows = (action: string) => ({ sql: 'select count(*) as n from audit_log where action = ?', values: () => [action] })

export const OTHER_FORMS: FormCase[] = [
  {
    what: 'an admission',
    who: 'nurse',
    path: inUnit('patients/admit'),
    form: 'Admit a patient',
    submit: 'Admit',
    empty: 'Choose the bed.',
    wrong: [
      { label: 'Height', typed: '1.76', words: /Height is in cm here: 176 cm\?/ },
      { label: 'Weight', typed: '8', words: /between 20 and 400 kg/ },
    ],
    fillRight: async (form) => {
      await form.getByRole('combobox', { name: 'Bed' }).selectOption({ index: 1 })
      await fill(form, {
        'Record number': 'W9001',
        'Family name': 'Vellacombe',
        'Given name': 'Uma',
        Height: '176',
        Weight: '80',
      })
      await form.getByLabel('Date of birth').fill('1959-04-03')
      await choose(form, 'Sex, for predicted body weight', 'Woman')
    },
    count: { sql: 'select count(*) as n from patients where record_number = ?', values: () => ['W9001'] },
    wrongRole: { who: 'lead', seen: /Not possible now/ },
  },
  {
    what: 'the beginning of ventilation',
    who: 'rt',
    path: ofPatient('breathing', 'begin'),
    form: 'Begin ventilation',
    submit: 'Begin ventilation',
    empty: 'Choose how ventilation began.',
    fillRight: async (form, ward) => {
      await choose(form, 'How ventilation began', 'Intubated')
      await observedAgo(form, 'Ventilated here since', 60, ward.zone)
    },
    count: rowsOfPatient('episodes', 'breathing'),
    wrongRole: { who: 'lead', seen: /Not possible now/ },
  },
  {
    what: 'a move to another bed',
    who: 'nurse',
    path: ofPatient('move', 'move'),
    form: 'Move to another bed',
    submit: 'Record the move',
    empty: 'Choose the bed.',
    fillRight: async (form) => {
      await form.getByRole('combobox', { name: 'Free bed' }).selectOption({ index: 2 })
    },
    count: rowsOfPatient('stays', 'move'),
    wrongRole: { who: 'lead', seen: /To read only|Not possible now|Not found/ },
  },
  {
    what: 'a correction of who the patient is',
    who: 'rt',
    path: ofPatient('reader', 'correct'),
    form: 'Correct who this is',
    submit: 'Record the correction',
    clear: async (form) => field(form, 'Family name').fill(''),
    empty: 'Give the family name.',
    wrong: [{ label: 'Height', typed: '70', words: /looks like inches; height is in cm here: 178 cm\?/ }],
    fillRight: (form) => fill(form, { 'Family name': 'Thistledown-Hart', Height: '178' }),
    count: auditRows('patient.correct'),
    wrongRole: readOnly('lead'),
  },
  {
    what: 'the end of a stay',
    who: 'nurse',
    path: ofPatient('leaving', 'leave'),
    form: 'End of the stay',
    submit: 'Record the end of the stay',
    empty: 'Choose how the stay ended.',
    fillRight: (form) => choose(form, 'How the stay ended', 'Left the unit'),
    count: {
      sql: 'select count(*) as n from stays where patient_id = ? and ended_at is not null',
      values: (ward) => [ward.patients.leaving.patientId],
    },
    wrongRole: { who: 'lead', seen: /To read only|Not possible now|Not found/ },
  },
  {
    what: 'the opening of a record of another unit',
    who: 'physician',
    path: inUnit('patients/open'),
    form: 'Open a record of another unit',
    submit: 'Open the record',
    empty: 'Give the record number.',
    fillRight: (form, ward) =>
      fill(form, {
        'Record number': ward.outsidePatient.recordNumber,
        'Why you open it': 'Asked for advice by the surgical unit',
      }),
    count: { sql: 'select count(*) as n from record_openings', values: () => [] },
    wrongRole: { who: 'administrator', seen: /Not found/ },
    mayStranger: true,
  },
  {
    what: 'a draft of the protocol',
    who: 'lead',
    path: inUnit('protocol/edit'),
    form: 'Draft of the protocol',
    submit: 'Save the draft',
    clear: async (form) => field(form, 'What changes, and why').fill(''),
    empty: 'Say in a few words what changes and why.',
    wrong: [{ label: 'FiO2: limit', typed: '50', words: /0\.60?|0\.50|fraction/ }],
    fillRight: (form) =>
      fill(form, { 'FiO2: limit': '0.45', Opens: '05:00', 'What changes, and why': 'A closer limit for FiO2, for discussion' }),
    count: auditRows('protocol.draft'),
    wrongRole: { who: 'rt', seen: /Not found|To read only|unit lead/ },
  },
]
