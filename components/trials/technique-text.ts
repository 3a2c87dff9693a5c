import type { TrialTechnique } from '@/lib/weaning/vocabulary'

type Numbers = { technique: TrialTechnique; pressureSupportCmH2O: number | null; peepCmH2O: number | null; fio2Fraction: number }

/** "pressure support 7 over PEEP 5 cmH2O, FiO2 0.40". */
export function techniqueText({ technique, pressureSupportCmH2O, peepCmH2O, fio2Fraction }: Numbers): string {
  const fio2 = `FiO2 ${fio2Fraction.toFixed(2)}`
  switch (technique) {
    case 't_piece':
      return `T-piece, ${fio2}`
    case 'cpap':
      return `CPAP ${peepCmH2O ?? 'not recorded'} cmH2O, ${fio2}`
    case 'pressure_support':
      return `pressure support ${pressureSupportCmH2O ?? 'not recorded'} over PEEP ${peepCmH2O ?? 'not recorded'} cmH2O, ${fio2}`
  }
}
