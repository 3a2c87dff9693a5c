/**
 * Whether two numbers are the same but for binary rounding: they differ by no more than a thousand-millionth of the larger one (of 1 when
 * both are smaller). Clinical values are typed with at most four decimals, and quotients of them differ from a limit by 0.00005 or more
 * when they differ at all, so this neither hides a real difference nor lets 7.42 − 7.35 = 0.0699999… miss "0.07 or more".
 * @example isSame(7.42 - 7.35, 0.07) // true
 */
export function isSame(a: number, b: number): boolean {
  return Math.abs(a - b) <= 1e-9 * Math.max(1, Math.abs(a), Math.abs(b))
}
