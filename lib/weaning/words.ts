import type { ObservedReading } from './protocol'
import type { UnknownReason } from './readings'
import type {
  Airway,
  AirwayEvent,
  BedsideSign,
  ClinicalRole,
  Cough,
  CriterionMark,
  DecisionChoice,
  EpisodeEnd,
  EpisodeStart,
  ExcuseReason,
  HoldOutcome,
  HoldSafetyItem,
  HoldStart,
  MailKind,
  MailState,
  NotTodayReason,
  RsbiCondition,
  ScreenCriterion,
  ScreenResult,
  Secretions,
  Sex,
  StayEnd,
  SupportAfter,
  TrialOutcome,
  TrialTechnique,
  VentilatorMode,
} from './vocabulary'

/** The words that a person reads for each item of the word lists, as they stand in the middle of a sentence. See sentenceCase. */
export const ROLE_WORDS: Record<ClinicalRole, string> = {
  rt: 'RT',
  nurse: 'Nurse',
  physician: 'Physician',
  unit_lead: 'Unit lead',
}

export const SEX_WORDS: Record<Sex, string> = { female: 'woman', male: 'man' }

/** The open taxonomy of control variable and breath sequence (Chatburn, from memory). */
export const MODE_WORDS: Record<VentilatorMode, string> = {
  'VC-CMV': 'volume control, every breath mandatory',
  'VC-IMV': 'volume control, mandatory and spontaneous breaths',
  'PC-CMV': 'pressure control, every breath mandatory',
  'PC-IMV': 'pressure control, mandatory and spontaneous breaths',
  'PC-CSV': 'pressure control, every breath spontaneous',
}

export const AIRWAY_WORDS: Record<Airway, string> = { endotracheal_tube: 'endotracheal tube', tracheostomy: 'tracheostomy' }

export const CRITERION_WORDS: Record<ScreenCriterion, string> = {
  fio2: 'FiO2',
  peep: 'PEEP',
  norepinephrine: 'norepinephrine',
  otherVasopressor: 'other vasopressor',
  ischaemia: 'active ischaemia in 24 h',
  spo2: 'SpO2',
  pfRatio: 'P/F ratio',
  ph: 'pH',
  spontaneousEffort: 'spontaneous effort',
  cough: 'cough on suction',
  secretions: 'secretions',
  rass: 'RASS',
  raisedIcp: 'raised intracranial pressure',
  neuromuscularBlockade: 'neuromuscular blockade',
  temperature: 'temperature',
  haemoglobin: 'haemoglobin',
  causeImproving: 'cause improving',
  rsbi: 'RSBI',
}

/** Unit of the value that a criterion compares; empty when it has none. */
export const CRITERION_UNITS: Record<ScreenCriterion, string> = {
  fio2: '',
  peep: 'cmH2O',
  norepinephrine: 'µg/kg/min',
  otherVasopressor: '',
  ischaemia: '',
  spo2: '%',
  pfRatio: 'mmHg',
  ph: '',
  spontaneousEffort: '',
  cough: '',
  secretions: '',
  rass: '',
  raisedIcp: '',
  neuromuscularBlockade: '',
  temperature: '°C',
  haemoglobin: 'g/dL',
  causeImproving: '',
  rsbi: '/min/L',
}

export const MARK_WORDS: Record<CriterionMark, string> = { met: 'met', not_met: 'not met', not_assessed: 'not assessed' }
export const SCREEN_RESULT_WORDS: Record<ScreenResult, string> = {
  ready: 'ready',
  not_ready: 'not ready',
  incomplete: 'incomplete',
  excused: 'excused',
}
export const UNKNOWN_WORDS: Record<UnknownReason, string> = {
  missing: 'not assessed',
  implausible: 'not a possible value',
  not_adult: 'not computed under 18 years',
  age_unknown: 'not computed while the age is unknown',
}
export const EXCUSE_WORDS: Record<ExcuseReason, string> = {
  comfort_care: 'comfort care',
  prone: 'prone position',
  ecmo: 'ECMO',
  planned_procedure: 'planned procedure',
  other: 'another reason',
}

export const COUGH_WORDS: Record<Cough, string> = { strong: 'strong', weak: 'weak', absent: 'absent' }
export const SECRETIONS_WORDS: Record<Secretions, string> = { scant: 'scant', moderate: 'moderate', copious: 'copious' }
export const RSBI_CONDITION_WORDS: Record<RsbiCondition, string> = {
  unsupported_one_minute: 'one minute without support',
  cpap: 'on CPAP',
  pressure_support: 'on pressure support',
}

export const HOLD_START_WORDS: Record<HoldStart, string> = { not_needed: 'not needed', unsafe: 'unsafe', started: 'started' }
export const HOLD_SAFETY_WORDS: Record<HoldSafetyItem, string> = {
  active_seizures: 'sedation for active seizures',
  alcohol_withdrawal: 'sedation for alcohol withdrawal',
  rising_dose_for_agitation: 'dose rising for agitation',
  neuromuscular_blockade: 'neuromuscular blocker running',
  ischaemia_24h: 'active myocardial ischaemia in 24 h',
  raised_icp: 'raised intracranial pressure',
}
export const HOLD_OUTCOME_WORDS: Record<HoldOutcome, string> = {
  tolerated: 'tolerated',
  not_tolerated: 'not tolerated',
  stopped: 'stopped for another reason',
}

export const SIGN_WORDS: Record<BedsideSign, string> = {
  accessory_muscles: 'accessory muscles in use',
  abdominal_paradox: 'abdominal paradox',
  sweating: 'sweating',
  marked_dyspnoea: 'marked dyspnoea',
  agitation: 'agitation',
  anxiety: 'anxiety',
  pain: 'pain',
  depressed_mental_state: 'depressed mental state',
  abrupt_mental_change: 'abrupt change of mental state',
  cyanosis: 'cyanosis',
  new_arrhythmia: 'new arrhythmia',
}
export const OBSERVED_WORDS: Record<ObservedReading, string> = {
  breathsPerMin: 'respiratory rate',
  tidalVolumeMl: 'tidal volume',
  rsbi: 'RSBI',
  spo2Percent: 'SpO2',
  heartRatePerMin: 'heart rate',
  systolicMmHg: 'systolic blood pressure',
  paCO2MmHg: 'PaCO2',
  paO2MmHg: 'PaO2',
  ph: 'pH',
}
export const OBSERVED_UNITS: Record<ObservedReading, string> = {
  breathsPerMin: '/min',
  tidalVolumeMl: 'mL',
  rsbi: '/min/L',
  spo2Percent: '%',
  heartRatePerMin: '/min',
  systolicMmHg: 'mmHg',
  paCO2MmHg: 'mmHg',
  paO2MmHg: 'mmHg',
  ph: '',
}

export const TECHNIQUE_WORDS: Record<TrialTechnique, string> = {
  t_piece: 'T-piece',
  cpap: 'CPAP',
  pressure_support: 'pressure support with PEEP',
}
export const TRIAL_OUTCOME_WORDS: Record<TrialOutcome, string> = {
  passed: 'passed',
  failed: 'failed',
  stopped: 'stopped for another reason',
}
export const DECISION_WORDS: Record<DecisionChoice, string> = {
  extubate: 'extubate',
  not_today: 'not today',
  tracheostomy_pathway: 'tracheostomy pathway',
  comfort_extubation: 'comfort-focused extubation',
}
export const NOT_TODAY_WORDS: Record<NotTodayReason, string> = {
  mental_state: 'mental state',
  airway_protection: 'airway protection',
  secretions: 'secretions',
  cuff_leak: 'cuff leak',
  fluid_overload: 'fluid overload',
  haemodynamics: 'haemodynamics',
  gas_exchange: 'gas exchange',
  procedure_planned: 'procedure planned',
  staffing: 'staffing',
  family_discussion: 'discussion with the family',
  other: 'another reason',
}
export const SUPPORT_WORDS: Record<SupportAfter, string> = { oxygen: 'oxygen', high_flow: 'high flow', niv: 'NIV' }

export const AIRWAY_EVENT_WORDS: Record<AirwayEvent, string> = {
  intubated: 'intubated',
  arrived_intubated: 'arrived intubated',
  reintubated: 'reintubated',
  extubated: 'extubated as planned',
  self_extubated: 'self-extubated',
  accidentally_extubated: 'extubated by accident',
  tracheostomy_placed: 'tracheostomy placed',
  ventilator_off: 'off the ventilator',
  ventilator_on: 'back on the ventilator',
}
export const EPISODE_START_WORDS: Record<EpisodeStart, string> = {
  intubated: 'intubated',
  arrived_intubated: 'arrived intubated',
  reintubated: 'reintubated',
  ventilator_on: 'back on the ventilator',
}
export const EPISODE_END_WORDS: Record<EpisodeEnd, string> = {
  extubated: 'extubated as planned',
  self_extubated: 'self-extubated',
  accidentally_extubated: 'extubated by accident',
  ventilator_off: 'off the ventilator',
  died: 'died',
  left_hospital: 'left the hospital',
}
export const STAY_END_WORDS: Record<StayEnd, string> = { moved: 'moved', left_unit: 'left the unit', died: 'died' }

export const MAIL_KIND_WORDS: Record<MailKind, string> = {
  morning_due: 'morning list',
  window_end: 'end of the screening window',
  decision_owed: 'decision owed',
  weekly_review: 'weekly review',
  record_opened: 'record opened',
  invitation: 'invitation',
  password_reset: 'password reset',
}
export const MAIL_STATE_WORDS: Record<MailState, string> = {
  queued: 'waiting',
  sending: 'being sent',
  sent: 'sent',
  kept: 'kept, not sent',
  failed: 'failed',
  unconfirmed: 'not confirmed',
}
