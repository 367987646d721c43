import { describe, expect, it } from 'vitest'
import { accessActionWords, accessKindWords } from '../../shared/accessWords.ts'

describe('an entry of the access history', () => {
  it.each([
    ['child.glance_read', 'Record: at a glance read', 'Read'],
    ['child.header_read', 'Record: name and details read', 'Read'],
    ['sessionNote.signed', 'Session note: signed', 'Written'],
    ['sessionNote.revisions', 'Session note: earlier texts read', 'Read'],
    ['sessionNotes.list', 'Session note: list read', 'Read'],
    ['letters.listOfChild', 'Letter: list read', 'Read'],
    ['letter.pdf', 'Letter: PDF read', 'Read'],
    ['sample.thumbnail', 'Handwriting sample: small picture read', 'Read'],
    ['episode.state_changed', 'Episode: state changed', 'Written'],
    ['letter.link_followed', 'Letter: link followed', 'Read'],
    ['goal.asked_again', 'Goal: asked again', 'Read'],
    ['consent.withdrawn', 'Consent: withdrawn', 'Written'],
    ['guardian.contact_changed', 'Carer: contact changed', 'Written'],
    ['child.changeState', 'Record: change state', 'Written'],
    ['histories.list', 'History: list read', 'Read'],
    ['history.locked', 'History: signed or sent', 'Written'],
    ['answerRequest.page', 'Questions to family or school: read', 'Read'],
    ['answerRequest.choices', 'Questions to family or school: whom to ask read', 'Read'],
    ['answerRequest.listed', 'Questions to family or school: list read', 'Read'],
    ['answerRequest.answered', 'Questions to family or school: answered', 'Written'],
    ['answerLink.opened', 'Questions by e-mail link: opened', 'Read'],
    ['answerLink.saved', 'Questions by e-mail link: saved', 'Written'],
    ['conclusion.report_opened', 'Conclusion: report opened', 'Read'],
    ['conclusion.countersigned', 'Conclusion: countersigned', 'Written'],
    ['alert.raised_by_hand', 'Warning sign: raised by hand', 'Written'],
    ['accessHistory.read', 'Access history: read', 'Read'],
    ['seatPlan.moved', 'Seat plan: moved', 'Written'],
  ])('%s reads “%s” and is %s', (action, words, kind) => {
    expect(accessActionWords(action)).toBe(words)
    expect(accessKindWords(action)).toBe(kind)
  })
})
