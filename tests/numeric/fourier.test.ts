import { describe, expect, it } from 'vitest'
import { transformOf } from '../../src/numeric/fourier.ts'

const sequence = (length: number): [Float64Array, Float64Array] => [
  Float64Array.from({ length }, (_, k) => Math.sin(1.3 * k * k) + 0.2 * k),
  Float64Array.from({ length }, (_, k) => Math.cos(0.7 * k * k)),
]

describe('discrete Fourier transform', () => {
  it.each([2, 4, 32, 128])('law: its definition, length %i', (length) => {
    const [re, im] = sequence(length)
    const [a, b] = [re.slice(), im.slice()]
    transformOf(length).forward(a, b)
    for (let k = 0; k < length; k++) {
      let [x, y] = [0, 0]
      for (let j = 0; j < length; j++) {
        const angle = (-2 * Math.PI * j * k) / length
        x += re[j]! * Math.cos(angle) - im[j]! * Math.sin(angle)
        y += re[j]! * Math.sin(angle) + im[j]! * Math.cos(angle)
      }
      expect(a[k]).toBeCloseTo(x, 9)
      expect(b[k]).toBeCloseTo(y, 9)
    }
  })

  it('law: the inverse undoes it, and power is kept', () => {
    const [re, im] = sequence(1024)
    const [a, b] = [re.slice(), im.slice()]
    const transform = transformOf(1024)
    transform.forward(a, b)
    const power = (x: Float64Array, y: Float64Array): number =>
      x.reduce((sum, one, k) => sum + one * one + y[k]! ** 2, 0)
    expect(power(a, b) / 1024 / power(re, im)).toBeCloseTo(1, 12)
    transform.inverse(a, b)
    for (let k = 0; k < 1024; k++) {
      expect(a[k]).toBeCloseTo(re[k]!, 10)
      expect(b[k]).toBeCloseTo(im[k]!, 10)
    }
  })

  it.each([0, 1, 3, 12, -4, 2.5])('refuses length %s', (length) => {
    expect(() => transformOf(length)).toThrow(RangeError)
  })
})
