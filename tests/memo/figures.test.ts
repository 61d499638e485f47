import { describe, expect, it } from 'vitest'
import type { Figure } from '../../src/memo/figure/figure.ts'
import { marginScale, marginStrip, SHOWN_MARGINS } from '../../src/memo/figure/margin-strip.ts'
import { speedBars, speedScale } from '../../src/memo/figure/speed-bars.ts'
import { toSvg } from '../../src/memo/figure/svg.ts'
import { aResult } from '../cli/a-result.ts'

const result = aResult(['a', 'b'], ['P28', 'F16', 'F7', 'F5'])
const speeds = result.cases
  .flatMap(({ checks }) => checks)
  .flatMap(({ required, available }) => [required, available])
  .filter((value) => value !== null)

/** What a figure says about a datum, in points. */
function places({ marks }: Figure): ReadonlyMap<string, number> {
  return new Map(
    marks.flatMap((mark): [string, number][] => {
      if (!('of' in mark) || mark.of === undefined) return []
      if (mark.kind === 'rect') return [[mark.of, mark.x + mark.width]]
      return [[mark.of, mark.kind === 'line' ? mark.x1 : mark.x]]
    }),
  )
}

describe('figures', () => {
  it('law: bars and strokes, read back through the axis, are the speeds of the result', () => {
    const figures = speedBars(result)
    expect(figures).toHaveLength(2)
    const found = new Map(figures.flatMap((figure) => [...places(figure)]))
    const scale = speedScale(speeds)
    let count = 0
    for (const { option, node, checks } of result.cases) {
      for (const { id, required, available } of checks) {
        if (required === null || available === null) continue
        count++
        expect(scale.invert(found.get(`required|${option}|${node}|${id}`)!)).toBeCloseTo(required, -3)
        expect(scale.invert(found.get(`available|${option}|${node}|${id}`)!)).toBeCloseTo(available, -3)
      }
    }
    expect(count).toBeGreaterThan(4)
  })

  it('law: dots, read back through the axis, are the margins of the result', () => {
    const found = places(marginStrip(result))
    const scale = marginScale()
    for (const { option, node, checks } of result.cases) {
      for (const { id, margin } of checks) {
        const x = found.get(`${option}|${node}|${id}`)
        if (margin === null) expect(x).toBeUndefined()
        else
          expect(scale.invert(x!)).toBeCloseTo(
            Math.min(Math.max(margin, SHOWN_MARGINS[0]), SHOWN_MARGINS[1]),
            9,
          )
      }
    }
    expect(scale.invert(found.get('guard')!)).toBeCloseTo(1.15, 9)
  })

  it('stay within their frame and say in words what they show', () => {
    for (const figure of [...speedBars(result), marginStrip(result)]) {
      for (const mark of figure.marks) {
        const [x, y] = mark.kind === 'line' ? [mark.x2, mark.y2] : [mark.x, mark.y]
        expect(x).toBeGreaterThanOrEqual(0)
        expect(x).toBeLessThanOrEqual(figure.width)
        expect(y).toBeLessThanOrEqual(figure.height)
      }
      for (const { id } of result.nodes) expect(figure.description).toContain(id)
      expect(toSvg(figure)).toMatch(/^<svg [^>]*role="img"[^>]*>.*<desc id=/)
    }
  })

  it('an SVG carries the same primitives as the figure, mark by mark', () => {
    const figure = marginStrip(result)
    const svg = toSvg(figure)
    for (const kind of ['line', 'rect', 'path', 'text'] as const) {
      const drawn = svg.match(new RegExp(`<${kind} `, 'g')) ?? []
      expect(drawn).toHaveLength(figure.marks.filter((mark) => mark.kind === kind).length)
    }
  })
})
