/**
 * Words of the word lists at the beginning of a line: the first letter capital, the rest as it is. "pH" stays "pH".
 * @example sentenceCase('other vasopressor') // 'Other vasopressor'
 */
export function sentenceCase(words: string): string {
  return words.startsWith('pH') ? words : words.charAt(0).toUpperCase() + words.slice(1)
}
