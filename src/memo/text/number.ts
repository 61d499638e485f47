import { base, type Runs, sup } from './runs.ts'

/**
 * A number inside a formula, in SI, to four significant digits: 0.95, 1.4 × 10¹¹.
 *
 * @param value any finite number; others are written as words
 */
export function setNumber(value: number): Runs {
  if (!Number.isFinite(value)) return [base(String(value))]
  if (value === 0) return [base('0')]
  const size = Math.abs(value)
  if (size >= 1e-3 && size < 1e5) return [base(withMinus(String(Number(value.toPrecision(4)))))]
  const [mantissa = '', exponent = ''] = value.toExponential(3).split('e')
  const shown = withMinus(String(Number(mantissa)))
  const power = withMinus(exponent.replace('+', ''))
  return shown === '1' ? [base('10'), sup(power)] : [base(`${shown}×10`), sup(power)]
}

const withMinus = (text: string): string => text.replace('-', '−')
