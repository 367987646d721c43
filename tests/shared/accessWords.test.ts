import { describe, expect, it } from 'vitest'
import { accessActionWords, accessKindWords } from '../../shared/accessWords.ts'

describe('an entry of the access history', () => {
  it.each([
    ['child.glance_read', 'Record: glance read', 'Read'],
    ['child.header_read', 'Record: header read', 'Read'],
    ['sessionNote.signed', 'Session note: signed', 'Written'],
    ['sessionNote.revisions', 'Session note: revisions', 'Read'],
    ['sessionNotes.list', 'Session note: list', 'Read'],
    ['letters.listOfChild', 'Letter: list of child', 'Read'],
    ['letter.pdf', 'Letter: pdf', 'Read'],
    ['sample.thumbnail', 'Handwriting sample: thumbnail', 'Read'],
    ['episode.state_changed', 'Episode: state changed', 'Written'],
    ['consent.withdrawn', 'Consent: withdrawn', 'Written'],
    ['guardian.contact_changed', 'Carer: contact changed', 'Written'],
    ['child.changeState', 'Record: change state', 'Written'],
    ['accessHistory.read', 'Access history: read', 'Read'],
    ['seatPlan.moved', 'Seat plan: moved', 'Written'],
  ])('%s reads “%s” and is %s', (action, words, kind) => {
    expect(accessActionWords(action)).toBe(words)
    expect(accessKindWords(action)).toBe(kind)
  })
})
