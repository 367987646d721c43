import { performance } from 'node:perf_hooks'
import { formsOfTheStart } from '../../server/migrations/1764580000000-formsOfTheStart.ts'
import { scoreForm } from '../../shared/formScores.ts'
import { defaultCutOffSet } from '../../shared/handUse.ts'

export interface ScoringFigures {
  form: string
  /** The very first scoring, before the engine has warmed to it. */
  firstMs: number
  /** 99 of 100 of the next ten thousand are faster; the very slowest are the machine's, busy with something else. */
  p99Ms: number
}

/** Time to score each form, every item answered. Runs on the engine that Chromium has too (V8). */
export const measureScoring = (): ScoringFigures[] =>
  formsOfTheStart.map(({ key, edition, definition }) => {
    const form = { id: `${key}.v${edition}`, definition }
    const answers = Object.fromEntries(
      definition.items.map(({ id }, index) => [
        id,
        definition.options[index % definition.options.length] ?? null,
      ]),
    )
    const timed = () => {
      const begun = performance.now()
      scoreForm(form, answers, defaultCutOffSet)
      return performance.now() - begun
    }
    const first = timed()
    const later = Array.from({ length: 10_000 }, timed).toSorted((a, b) => a - b)
    return { form: form.id, firstMs: first, p99Ms: later[9_900] ?? Number.NaN }
  })
