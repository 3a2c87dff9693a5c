/**
 * What a typed value can be. Outside the hard limits it is refused; outside the soft limits it is kept after a second look and marked.
 * Limits of plausibility for adults, not of care: common practice, no source.
 */
export type ReadingLimits = {
  /** How a sentence names it: "Give the FiO2, as a number." */
  label: string
  unit: string
  hardMin: number
  hardMax: number
  softMin: number
  softMax: number
  /** Decimals shown, never used for comparing. */
  decimals: number
  isWhole: boolean
}

const limits = (
  label: string,
  unit: string,
  [hardMin, hardMax]: [number, number],
  [softMin, softMax]: [number, number],
  decimals: number,
  isWhole = false,
): ReadingLimits => ({ label, unit, hardMin, hardMax, softMin, softMax, decimals, isWhole })

export const HARD_LIMITS = {
  fio2Fraction: limits('the FiO2', 'as a fraction', [0.21, 1], [0.21, 1], 2),
  paO2FiO2Fraction: limits('the FiO2 at the time of the gas', 'as a fraction', [0.21, 1], [0.21, 1], 2),
  peepCmH2O: limits('the PEEP', 'cmH2O', [0, 30], [0, 20], 0),
  setRatePerMin: limits('the set rate', '/min', [1, 80], [4, 40], 0),
  measuredRatePerMin: limits('the measured rate', '/min', [1, 80], [4, 50], 0),
  breathsPerMin: limits('the respiratory rate', '/min', [1, 80], [4, 50], 0),
  setTidalVolumeMl: limits('the set tidal volume', 'mL', [50, 2000], [150, 1000], 0),
  measuredTidalVolumeMl: limits('the measured tidal volume', 'mL', [50, 2000], [150, 1000], 0),
  tidalVolumeMl: limits('the tidal volume', 'mL', [50, 2000], [150, 1000], 0),
  inspiratoryPressureCmH2O: limits('the inspiratory pressure', 'cmH2O', [0, 80], [5, 40], 0),
  pressureSupportCmH2O: limits('the pressure support', 'cmH2O', [0, 50], [0, 25], 0),
  peakPressureCmH2O: limits('the peak pressure', 'cmH2O', [0, 100], [8, 50], 0),
  plateauPressureCmH2O: limits('the plateau pressure', 'cmH2O', [0, 80], [8, 40], 0),
  spo2Percent: limits('the SpO2', '%', [40, 100], [80, 100], 0),
  heartRatePerMin: limits('the heart rate', '/min', [20, 250], [40, 180], 0),
  systolicMmHg: limits('the systolic blood pressure', 'mmHg', [30, 300], [70, 220], 0),
  diastolicMmHg: limits('the diastolic blood pressure', 'mmHg', [10, 200], [30, 130], 0),
  ph: limits('the pH', '', [6.6, 7.9], [7.0, 7.7], 2),
  paCO2MmHg: limits('the PaCO2', 'mmHg', [10, 200], [20, 100], 0),
  paO2MmHg: limits('the PaO2', 'mmHg', [20, 700], [40, 500], 0),
  bicarbonateMmolPerL: limits('the bicarbonate', 'mmol/L', [2, 70], [10, 45], 0),
  lactateMmolPerL: limits('the lactate', 'mmol/L', [0, 40], [0, 15], 1),
  haemoglobinGPerDl: limits('the haemoglobin', 'g/dL', [2, 25], [5, 20], 1),
  norepinephrineMcgPerKgMin: limits('the norepinephrine dose', 'µg/kg/min', [0, 5], [0, 1], 2),
  rass: limits('the RASS', '', [-5, 4], [-5, 4], 0, true),
  temperatureC: limits('the temperature', '°C', [25, 45], [33, 41], 1),
  heightCm: limits('the height', 'cm', [100, 250], [140, 210], 0),
  weightKg: limits('the weight', 'kg', [20, 400], [35, 200], 0),
} as const satisfies Record<string, ReadingLimits>

export type LimitedReading = keyof typeof HARD_LIMITS
