/**
 * The word lists of the record. Columns, schemas, rules and screens all read these, so that a word exists once.
 * Ventilator modes use the open taxonomy of control variable and breath sequence (Chatburn, from memory).
 */
export const CLINICAL_ROLES = ['rt', 'nurse', 'physician', 'unit_lead'] as const
export type ClinicalRole = (typeof CLINICAL_ROLES)[number]

export const SEXES = ['female', 'male'] as const
export type Sex = (typeof SEXES)[number]

export const VENTILATOR_MODES = ['VC-CMV', 'VC-IMV', 'PC-CMV', 'PC-IMV', 'PC-CSV'] as const
export type VentilatorMode = (typeof VENTILATOR_MODES)[number]

export const AIRWAYS = ['endotracheal_tube', 'tracheostomy'] as const
export type Airway = (typeof AIRWAYS)[number]

export const SCREEN_CRITERIA = [
  'fio2',
  'peep',
  'norepinephrine',
  'otherVasopressor',
  'ischaemia',
  'spo2',
  'pfRatio',
  'ph',
  'spontaneousEffort',
  'cough',
  'secretions',
  'rass',
  'raisedIcp',
  'neuromuscularBlockade',
  'temperature',
  'haemoglobin',
  'causeImproving',
  'rsbi',
] as const
export type ScreenCriterion = (typeof SCREEN_CRITERIA)[number]

export const CRITERION_MARKS = ['met', 'not_met', 'not_assessed'] as const
export type CriterionMark = (typeof CRITERION_MARKS)[number]

export const SCREEN_RESULTS = ['ready', 'not_ready', 'incomplete', 'excused'] as const
export type ScreenResult = (typeof SCREEN_RESULTS)[number]

export const EXCUSE_REASONS = ['comfort_care', 'prone', 'ecmo', 'planned_procedure', 'other'] as const
export type ExcuseReason = (typeof EXCUSE_REASONS)[number]

export const COUGHS = ['strong', 'weak', 'absent'] as const
export type Cough = (typeof COUGHS)[number]
export const SECRETIONS = ['scant', 'moderate', 'copious'] as const
export type Secretions = (typeof SECRETIONS)[number]

/** How rate and volume were measured for the RSBI; values on support read lower than unsupported ones. */
export const RSBI_CONDITIONS = ['unsupported_one_minute', 'cpap', 'pressure_support'] as const
export type RsbiCondition = (typeof RSBI_CONDITIONS)[number]

export const HOLD_STARTS = ['not_needed', 'unsafe', 'started'] as const
export type HoldStart = (typeof HOLD_STARTS)[number]
export const HOLD_SAFETY_ITEMS = [
  'active_seizures',
  'alcohol_withdrawal',
  'rising_dose_for_agitation',
  'neuromuscular_blockade',
  'ischaemia_24h',
  'raised_icp',
] as const
export type HoldSafetyItem = (typeof HOLD_SAFETY_ITEMS)[number]
export const HOLD_OUTCOMES = ['tolerated', 'not_tolerated', 'stopped'] as const
export type HoldOutcome = (typeof HOLD_OUTCOMES)[number]

export const BEDSIDE_SIGNS = [
  'accessory_muscles',
  'abdominal_paradox',
  'sweating',
  'marked_dyspnoea',
  'agitation',
  'anxiety',
  'pain',
  'depressed_mental_state',
  'abrupt_mental_change',
  'cyanosis',
  'new_arrhythmia',
] as const
export type BedsideSign = (typeof BEDSIDE_SIGNS)[number]

export const TRIAL_TECHNIQUES = ['t_piece', 'cpap', 'pressure_support'] as const
export type TrialTechnique = (typeof TRIAL_TECHNIQUES)[number]
export const TRIAL_OUTCOMES = ['passed', 'failed', 'stopped'] as const
export type TrialOutcome = (typeof TRIAL_OUTCOMES)[number]

export const DECISION_CHOICES = ['extubate', 'not_today', 'tracheostomy_pathway', 'comfort_extubation'] as const
export type DecisionChoice = (typeof DECISION_CHOICES)[number]
export const NOT_TODAY_REASONS = [
  'mental_state',
  'airway_protection',
  'secretions',
  'cuff_leak',
  'fluid_overload',
  'haemodynamics',
  'gas_exchange',
  'procedure_planned',
  'staffing',
  'family_discussion',
  'other',
] as const
export type NotTodayReason = (typeof NOT_TODAY_REASONS)[number]
export const SUPPORTS_AFTER = ['oxygen', 'high_flow', 'niv'] as const
export type SupportAfter = (typeof SUPPORTS_AFTER)[number]

export const AIRWAY_EVENTS = [
  'intubated',
  'arrived_intubated',
  'reintubated',
  'extubated',
  'self_extubated',
  'accidentally_extubated',
  'tracheostomy_placed',
  'ventilator_off',
  'ventilator_on',
] as const
export type AirwayEvent = (typeof AIRWAY_EVENTS)[number]

export const EPISODE_STARTS = ['intubated', 'arrived_intubated', 'reintubated', 'ventilator_on'] as const
export type EpisodeStart = (typeof EPISODE_STARTS)[number]
export const EPISODE_ENDS = [
  'extubated',
  'self_extubated',
  'accidentally_extubated',
  'ventilator_off',
  'died',
  'left_hospital',
] as const
export type EpisodeEnd = (typeof EPISODE_ENDS)[number]

export const STAY_ENDS = ['moved', 'left_unit', 'died'] as const
export type StayEnd = (typeof STAY_ENDS)[number]

export const MAIL_KINDS = [
  'morning_due',
  'window_end',
  'decision_owed',
  'weekly_review',
  'record_opened',
  'invitation',
  'password_reset',
] as const
export type MailKind = (typeof MAIL_KINDS)[number]
export const MAIL_STATES = ['queued', 'sending', 'sent', 'kept', 'failed', 'unconfirmed'] as const
export type MailState = (typeof MAIL_STATES)[number]

export const ACCOUNT_LINK_KINDS = ['setup', 'invitation'] as const
export type AccountLinkKind = (typeof ACCOUNT_LINK_KINDS)[number]
