export const adminKeys = {
  root: ['admin'] as const,
  people: () => [...adminKeys.root, 'people'] as const,
  units: () => [...adminKeys.root, 'units'] as const,
}
