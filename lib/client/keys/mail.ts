export const mailKeys = {
  root: ['mail'] as const,
  unit: (unitId: string) => [...mailKeys.root, unitId] as const,
}
