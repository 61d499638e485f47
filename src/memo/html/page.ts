import type { Verdict } from '../../verdict/result.ts'
import type { Figure } from '../figure/figure.ts'
import { toSvg } from '../figure/svg.ts'
import type { MemoModel, StepShown } from '../model/memo-model.ts'
import type { Runs } from '../text/runs.ts'
import { PAINT } from '../text/verdict.ts'
import { cssText, nameAndValue, runsToHtml, stepRow } from './marks.ts'

/** Templates by name: `memo` and its partials. */
export type Templates = Readonly<Record<string, string>>

/**
 * The memo as one self-contained page.
 *
 * @param model what the memo says
 * @param templates `memo` and every partial it names, as text
 * @param tool name and version for the page's own record
 */
export async function toHtml(model: MemoModel, templates: Templates, tool: string): Promise<string> {
  const { default: Handlebars } = await import('handlebars')
  const engine = Handlebars.create()
  const row = remembered(stepRow)
  const safe = (html: string) => new Handlebars.SafeString(html)
  engine.registerHelper({
    math: (runs: Runs) => safe(runsToHtml(runs)),
    stepRows: (steps: readonly StepShown[]) => safe(steps.map(row).join('')),
    nameAndValue: (step: StepShown) => safe(nameAndValue(step)),
    svg: (figure: Figure) => safe(toSvg(figure)),
    sign: (verdict: Verdict) => PAINT[verdict].sign,
    cssText: (text: string) => safe(cssText(text)),
    increment: (index: number) => index + 1,
  })
  for (const [name, text] of Object.entries(templates))
    if (name !== 'memo') engine.registerPartial(name, text)
  return engine.compile(templates.memo ?? '', { strict: false, knownHelpersOnly: false })({ ...model, tool })
}

/** The same step is set once, however often it is shown. */
function remembered(set: (step: StepShown) => string): (step: StepShown) => string {
  const known = new Map<StepShown, string>()
  return (step) => {
    const html = known.get(step) ?? set(step)
    known.set(step, html)
    return html
  }
}
