export const todayKeys = {
  root: ['today'] as const,
  unit: (unitId: string) => [...todayKeys.root, unitId] as const,
}
