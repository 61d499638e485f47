/** Writes an SI value with its unit; `shown` asks for a unit of the same kind. */
export type QuantityText = (valueSI: number, unitSI: string, shown?: string, digits?: number) => string

const SCALES: Readonly<Record<string, readonly (readonly [number, string])[]>> = {
  Hz: [
    [1e9, 'GHz'],
    [1e6, 'MHz'],
    [1e3, 'kHz'],
  ],
  s: [
    [1e-3, 'ms'],
    [1e-6, 'µs'],
    [1e-9, 'ns'],
    [1e-12, 'ps'],
    [0, 'fs'],
  ],
  F: [
    [1e-12, 'pF'],
    [0, 'fF'],
  ],
  A: [
    [1, 'A'],
    [1e-3, 'mA'],
    [0, 'µA'],
  ],
  W: [
    [1, 'W'],
    [0, 'mW'],
  ],
  V: [
    [0.1, 'V'],
    [0, 'mV'],
  ],
  m: [
    [1e-6, 'µm'],
    [0, 'nm'],
  ],
  'A/m': [[0, 'mA/µm']],
  'F/m': [[0, 'fF/µm']],
  'F/m^2': [[0, 'fF/µm²']],
  'ohm*m': [[0, 'Ω·µm']],
  'V/m': [[0, 'V/µm']],
  'm^2/(V*s)': [[0, 'cm²/(V·s)']],
}

/**
 * One unit for values that stand side by side, chosen by the largest.
 *
 * @param values SI values, nulls ignored
 * @param unit SI unit
 * @returns a unit for display, or undefined to leave the choice to the writer of quantities
 */
export function commonUnit(values: readonly (number | null)[], unit: string): string | undefined {
  const scale = SCALES[unit]
  const largest = Math.max(0, ...values.map((value) => (value === null ? 0 : Math.abs(value))))
  if (scale === undefined || largest === 0) return undefined
  return scale.find(([from]) => largest >= from)?.[1]
}

/** A value or a dash, in the unit given or the common one. */
export function valueText(
  value: number | null,
  unit: string,
  write: QuantityText,
  shown: string | undefined = commonUnit([value], unit),
): string {
  if (value === null) return '–'
  if (!Number.isFinite(value)) return value > 0 ? 'unbounded' : 'not a number'
  return write(value, unit, shown, 3)
}
