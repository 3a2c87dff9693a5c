/** A search parameter given once; null when it is missing or given several times. */
export function oneParam(params: Record<string, string | string[] | undefined>, name: string): string | null {
  const value = params[name]
  return typeof value === 'string' && value !== '' ? value : null
}
