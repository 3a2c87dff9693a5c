export const protocolKeys = {
  root: ['protocols'] as const,
  unit: (unitId: string) => [...protocolKeys.root, unitId] as const,
}
