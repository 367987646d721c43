import { describe, expect, it } from 'vitest'
import { ValidationError } from 'yup'
import { editionProblems, editionSchemaAfter } from '../../shared/formEditions.ts'
import type { FormDefinition } from '../../shared/forms.ts'
import { startForm, startForms } from '../support/startForms.ts'

const before = startForm('ten-task').definition
const changed = (change: (words: FormDefinition) => unknown): FormDefinition => {
  const words = structuredClone(before)
  change(words)
  return words
}

/* What an edition keeps is the clinic's own rule: answers to two editions are compared item by item. */
describe('a new edition of a form', () => {
  it('may change every word', () => {
    const next = changed((words) => {
      words.title = 'Ten things to do'
      words.informants = ['guardian']
      words.items.forEach((item) => (item.label = `${item.label}, then`))
      words.cautions = ['Another caution.']
    })
    expect(editionProblems(before, next)).toEqual({})
  })

  it.each([
    ['the method', (w: FormDefinition) => (w.scoring = 'one_mark'), ['definition.scoring']],
    ['the answers', (w: FormDefinition) => w.options.reverse(), ['definition.options']],
    ['the cut-offs', (w: FormDefinition) => (w.cutOffSet = 'sixty'), ['definition.cutOffSet']],
    ['the order of activities', (w: FormDefinition) => w.items.reverse(), ['definition.items']],
    [
      'a caution, by leaving it out',
      (w: FormDefinition) => (w.items[5]!.caution = null),
      ['definition.items[5].caution'],
    ],
    [
      'the child’s words, by leaving them out',
      (w: FormDefinition) => (w.items[0]!.childLabel = null),
      ['definition.items[0].childLabel'],
    ],
  ] as [string, (words: FormDefinition) => unknown, string[]][])(
    'may not change %s',
    (_what, change, fields) => {
      expect(Object.keys(editionProblems(before, changed(change)))).toEqual(fields)
    },
  )

  it('needs no words for the child once no child shows it', () => {
    const next = changed((words) => {
      words.informants = ['guardian']
      words.items[0]!.childLabel = null
    })
    expect(editionProblems(before, next)).toEqual({})
  })

  it('is checked in the browser by the same rules, each beside its field', async () => {
    const next = changed((words) => {
      words.title = ' '
      words.items[3]!.caution = ''
    })
    const schema = editionSchemaAfter(before)
    const refused = await schema
      .validate({ key: 'ten-task', definition: next }, { abortEarly: false })
      .catch((error: unknown) => error)
    expect(refused).toBeInstanceOf(ValidationError)
    expect([...new Set((refused as ValidationError).inner.map(({ path }) => path))].toSorted()).toEqual([
      'definition.items[3].caution',
      'definition.title',
    ])
    for (const { key, definition } of startForms())
      await expect(editionSchemaAfter(definition).validate({ key, definition })).resolves.toBeTruthy()
  })
})
