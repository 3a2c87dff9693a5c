const LONGEST_ROW = 100

/**
 * Bed labels out of a line of text: "M01, M02" or a row "M01..M16", whose numbers keep their leading zeros. What cannot be read as
 * a row stays one label, so that the form can say what is wrong with it.
 */
export function readBedLabels(text: string): string[] {
  return text
    .split(/[,;\n]/)
    .map((part) => part.trim())
    .filter((part) => part !== '')
    .flatMap(readRow)
}

function readRow(part: string): string[] {
  const row = /^(\D*)(\d{1,4})\s*\.{2,3}\s*(\D*)(\d{1,4})$/.exec(part)
  const [, prefix = '', first = '', lastPrefix = '', last = ''] = row ?? []
  const count = Number(last) - Number(first) + 1
  if (!row || (lastPrefix !== '' && lastPrefix !== prefix) || count < 1 || count > LONGEST_ROW) return [part]
  return Array.from({ length: count }, (_, at) => `${prefix}${String(Number(first) + at).padStart(first.length, '0')}`)
}
