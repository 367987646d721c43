import { describe, expect, it } from 'vitest'
import {
  canonicalNote,
  missingFromNote,
  noteDraftSchema,
  noteSummary,
  type NoteDraft,
} from '../../shared/sessionNotes.ts'

const note: NoteDraft = {
  heldOn: '2026-06-10',
  startTime: '10:00',
  minutes: 45,
  type: 'session',
  present: 'Mother',
  assent: 'willing',
  said: '“It smudges less.”',
  observed: 'Paper turned 20°.',
  meaning: 'Tilt helps.',
  plan: 'Try the same at school.',
  goalIds: [],
}

describe('canonicalNote', () => {
  const canonical = canonicalNote('n1', 'c1', note)

  it.each(Object.keys(note) as (keyof NoteDraft)[])('differs when %s differs', (part) => {
    const other = { ...note, [part]: part === 'goalIds' ? ['g1'] : part === 'minutes' ? 50 : 'changed' }
    expect(canonicalNote('n1', 'c1', other)).not.toBe(canonical)
  })

  it('differs for another note and for another child', () => {
    expect(canonicalNote('n2', 'c1', note)).not.toBe(canonical)
    expect(canonicalNote('n1', 'c2', note)).not.toBe(canonical)
  })

  it('does not depend on the order in which the parts were sent', () => {
    const reversed = Object.fromEntries(Object.entries(note).toReversed()) as NoteDraft
    expect(canonicalNote('n1', 'c1', reversed)).toBe(canonical)
  })

  it('keeps words that move from one part to the next apart', () => {
    expect(canonicalNote('n1', 'c1', { ...note, said: 'a', observed: '' })).not.toBe(
      canonicalNote('n1', 'c1', { ...note, said: '', observed: 'a' }),
    )
  })
})

describe('noteSummary', () => {
  it('shows a short plan as it is, on one line', () => {
    expect(noteSummary('Try the slope board.\n\nThen the  mouse. ')).toBe(
      'Try the slope board. Then the mouse.',
    )
  })

  it('cuts a long plan between words, within what the list can keep', () => {
    const summary = noteSummary('slant the page a little more '.repeat(20))
    expect(summary.length).toBeLessThanOrEqual(160)
    expect(summary).toMatch(/ (slant|the|page|a|little|more)…$/)
  })

  it('counts characters, not halves of them, and never leaves half of one', () => {
    const summary = noteSummary('🌻'.repeat(200))
    expect([...summary]).toHaveLength(160)
    expect(() => encodeURIComponent(summary), 'no half character').not.toThrow()
  })
})

describe('a note draft', () => {
  it('may be empty, and then says what signing will ask for', () => {
    expect(noteDraftSchema.isValidSync({ ...note, said: '', observed: '', meaning: '', plan: '' })).toBe(true)
    expect(missingFromNote({ observed: ' ', meaning: '\n', plan: '' })).toEqual({
      observed: 'Write what was seen or measured',
      meaning: 'Write what it means',
      plan: 'Write what happens next',
    })
  })

  it.each([
    ['a NUL', 'Paper\u0000turned'],
    ['half a character', 'Paper \ud83d turned'],
  ])('refuses %s, which could not be kept', (_what, observed) => {
    expect(() => noteDraftSchema.validateSync({ ...note, observed })).toThrow(/cannot be kept/)
  })
})
