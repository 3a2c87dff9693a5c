export const patientKeys = {
  root: ['patients'] as const,
  page: (patientId: string) => [...patientKeys.root, 'page', patientId] as const,
  unit: (unitId: string) => [...patientKeys.root, 'unit', unitId] as const,
}
