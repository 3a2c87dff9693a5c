/**
 * Where a published figure was read. found: in the paper, its abstract or its table. secondary: in a text that repeats it.
 * from memory: not seen, to be checked against the paper. derived: worked out here. no source: common practice or this product's choice.
 */
export type Provenance = 'found' | 'secondary' | 'from memory' | 'derived' | 'no source'

export const SOURCES = {
  boles2007: 'Boles 2007, doi:10.1183/09031936.00010206',
  girard2008: 'Girard 2008, doi:10.1016/S0140-6736(08)60105-1',
  ely1996: 'Ely 1996, doi:10.1056/NEJM199612193352502',
  sessler2002: 'Sessler 2002, doi:10.1164/rccm.2107138',
} as const

/** The source as it stands beside a limit: "Girard 2008, doi:… (from memory)". */
export function sourceText(source: keyof typeof SOURCES, provenance: Provenance): string {
  return provenance === 'found'
    ? SOURCES[source]
    : `${SOURCES[source]} (${provenance === 'secondary' ? 'from a text that repeats it' : provenance})`
}
