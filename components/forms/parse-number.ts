export type ParsedNumber = { value: number | null; problem: string | null }

const UNREADABLE = 'Write a number in digits, such as 0.40.'

/**
 * Text of a number field to a number. Empty is null (not assessed), what cannot be read is NaN with words that say what would be right.
 * A decimal comma is read as a point. "1,450" could be 1450 or 1.45, so it is refused rather than guessed.
 */
export function parseNumber(text: string): ParsedNumber {
  const typed = text.trim().replace(/^[\u2212\u2013]/, '-')
  if (typed === '') return { value: null, problem: null }
  if (/^[-+]?[1-9]\d{0,2},\d{3}$/.test(typed)) {
    const plain = typed.replace('+', '')
    return {
      value: NaN,
      problem: `Write ${plain.replace(',', '')} or ${plain.replace(',', '.')}: a comma before three digits could mean either.`,
    }
  }
  if (!/^[-+]?(\d+([.,]\d*)?|[.,]\d+)$/.test(typed)) return { value: NaN, problem: UNREADABLE }
  return { value: Number(typed.replace(',', '.')), problem: null }
}

/** The text for a value that did not come from the keyboard. */
export function numberText(value: unknown): string {
  return typeof value === 'number' && !Number.isNaN(value) ? String(value) : ''
}
