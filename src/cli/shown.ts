import { formatQuantity } from '../quantity/format.ts'

/**
 * A value for the terminal: four figures and a unit that stays on the same line as its number.
 *
 * @param value SI value; null shows as a dash
 * @param unit SI unit, `1` when dimensionless
 * @param shown unit to show it in; chosen by size when absent
 */
export function shownValue(value: number | null, unit: string, shown?: string): string {
  return value === null ? '–' : formatQuantity(value, unit, shown, 4).replaceAll(' ', '\u00a0')
}
