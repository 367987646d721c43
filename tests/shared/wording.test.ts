import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { bareScores, checkWording, namesOfOthers } from '../../shared/wording.ts'
import { wordingRules } from '../../shared/wordingRules.ts'

const found = (text: string) => checkWording(text).map(({ ruleId }) => ruleId)

// The list is the clinic's language guide for letters; inflections and innocents were written by hand.
describe('checkWording: blocked', () => {
  it.each([
    ['wrong-hand', 'Mateo writes with the wrong hand.', 'wrong hand'],
    ['wrong-hand', 'He is wrong-handed.', 'wrong-handed'],
    ['good-or-bad-hand', 'She uses her good hand.', 'good hand'],
    ['good-or-bad-hand', 'Hold it with the BAD hand', 'BAD hand'],
    ['correct-hand', 'Please give it into his correct hand.', 'his correct hand'],
    ['correct-hand', 'Use the proper hand', 'the proper hand'],
    ['suffers-from-left-handedness', 'He suffers from left-handedness.', 'suffers from left-handedness'],
    ['suffers-from-left-handedness', 'suffering from being left‑handed', 'suffering from being left‑handed'],
    ['label-for-left-hander', 'Our lefty is doing well.', 'lefty'],
    ['label-for-left-hander', 'Two southpaws sit together.', 'southpaws'],
    ['judging-word', 'Her writing is messy.', 'messy'],
    ['judging-word', 'He writes messily.', 'messily'],
    ['judging-word', 'She is clumsy with scissors.', 'clumsy'],
    ['judging-word', 'Clumsiness was seen.', 'Clumsiness'],
    ['judging-word', 'An awkward grip.', 'awkward'],
    ['judging-word', 'He holds it awkwardly.', 'awkwardly'],
    ['judging-word', 'Careless mistakes', 'Careless'],
    ['judging-word', 'She is not lazy.', 'lazy'],
    ['slur-for-left-hander', 'They called him cack-handed.', 'cack-handed'],
    ['slur-for-left-hander', 'a bit cackhanded', 'cackhanded'],
    ['slur-for-left-hander', 'keggy handed', 'keggy handed'],
    ['slur-for-left-hander', 'corrie-fisted', 'corrie-fisted'],
    ['slur-for-left-hander', 'He is all thumbs.', 'all thumbs'],
    ['abnormal-dominance', 'There is abnormal hand dominance.', 'abnormal hand dominance'],
    ['abnormal-dominance', 'deviant laterality', 'deviant laterality'],
    ['change-the-hand', 'We will retrain the hand.', 'retrain the hand'],
    ['change-the-hand', 'We aim to correct the child’s hand.', 'correct the child’s hand'],
    ['change-the-hand', 'Please convert her handedness.', 'convert her handedness'],
    ['change-the-hand', 'He should switch to the right hand.', 'switch to the right hand'],
    ['change-the-hand', 'A converted left-hander', 'converted left-hander'],
    ['change-the-hand', 'Retraining the hand takes months.', 'Retraining the hand'],
    ['change-the-hand', 'He was keen, and we will retrain the left hand.', 'retrain the left hand'],
  ])('%s: %s', (ruleId, text, matched) => {
    const hits = checkWording(text)
    expect(hits.map((hit) => [hit.ruleId, hit.text])).toEqual([[ruleId, matched]])
    expect(hits[0]!.level).toBe('blocked')
    expect(text.slice(hits[0]!.start, hits[0]!.end)).toBe(matched)
  })
})

describe('checkWording: discouraged', () => {
  it.each([
    ['failed', 'He failed to finish.', 'failed'],
    ['failed', 'The grip is failing.', 'failing'],
    ['still-left-handed', 'Anouk is still left-handed.', 'still left-handed'],
    ['still-left-handed', 'She still uses her left hand.', 'still uses her left'],
    ['hooked', 'He writes with a hooked wrist.', 'hooked'],
    ['hooked', 'She hooks her hand over the line.', 'hooks her hand'],
    ['confused-dominance', 'There is confused dominance.', 'confused dominance'],
    ['normal-meaning-right-handed', 'He eats with the normal hand.', 'normal hand'],
    ['normal-meaning-right-handed', 'Normal handedness is expected.', 'Normal handedness'],
    ['normal-meaning-right-handed', 'Unlike normal children, she turns the page.', 'normal children'],
    ['poor-compliance', 'Poor compliance with home practice.', 'Poor compliance'],
    ['poor-compliance', 'The family was non-compliant.', 'non-compliant'],
    ['did-not-attend', 'DNA twice in March.', 'DNA'],
    ['did-not-attend', 'He didn’t attend.', 'didn’t attend'],
    ['did-not-attend', 'She did not attend the review.', 'did not attend'],
    ['did-not-attend', 'They failed to attend.', 'failed to attend'],
  ])('%s: %s', (ruleId, text, matched) => {
    const hits = checkWording(text)
    expect(hits.map((hit) => [hit.ruleId, hit.text])).toEqual([[ruleId, matched]])
    expect(hits[0]!.level).toBe('discouraged')
    expect(hits[0]!.instead.length).toBeGreaterThan(0)
  })
})

describe('checkWording: innocents', () => {
  it.each([
    'She marked the correct answer.',
    'The right hand steadies the page.',
    'He has his own left-handed scissors.',
    'Her good handwriting shows on the wall.',
    'Good hand skills and good hand-eye coordination.',
    'He is in good hands.',
    'We keep to a normal bedtime.',
    'Normal hand strength on both sides.',
    'A lazy Sunday with a book.',
    'She wears a patch for a lazy eye.',
    'He enjoys messy play.',
    'They are hooked on the story.',
    'Hang the coat on the hook.',
    'He never fails to smile.',
    'Please practise daily without fail.',
    'She was not brought to the visit on 3 Mar 2026.',
    'Mateo is left-handed and uses the left hand for drawing.',
    'She is still choosing a hand.',
    'Show the correct hand position on the scissors.',
    'The hand lies above the line.',
    'Turn the page and move it to the left.',
    'He was left alone to finish.',
    'Please switch the light on.',
    'She writes with her right hand and her left hand helps.',
    'Please break the line after each word.',
    'Attend to the dots first.',
  ])('%s', (text) => {
    expect(found(text)).toEqual([])
  })
})

describe('checkWording: change of hand told as history', () => {
  it.each([
    'She was asked to use the right hand at age 5.',
    'She was asked to switch to the right hand at age 5.',
    'His hand had been corrected: he was retrained to use the right hand at nursery.',
    'He had been made to change to the right hand before he came to us.',
    'We do not advise changing her handedness.',
    'Please do not move the pencil to the other hand.',
    'Never switch the pencil to the right hand.',
    'Her school had moved the pencil to the other hand; she was told to at 5.',
  ])('allows "%s"', (text) => {
    expect(found(text)).toEqual([])
  })

  it.each([
    'She was asked about school. We should switch to the right hand now.',
    'He was tired. Retrain the hand at home.',
    'She must be converted to the right hand.',
    'It has been decided to switch Amara to the right hand.',
  ])('does not let another sentence or a plan excuse it: "%s"', (text) => {
    expect(found(text)).toEqual(['change-the-hand'])
  })
})

describe('checkWording: positions and order', () => {
  it('reports hits in the order of the text with positions that cut them out', () => {
    const text = 'The lefty’s page is messy.\n\nHe didn’t attend, and it is the wrong hand.'
    const hits = checkWording(text)
    expect(hits.map(({ text: words }) => words)).toEqual(['lefty', 'messy', 'didn’t attend', 'wrong hand'])
    for (const hit of hits) expect(text.slice(hit.start, hit.end)).toBe(hit.text)
  })

  it('finds the same words wherever they stand in a letter', () => {
    fc.assert(
      fc.property(fc.nat(30), fc.nat(30), (before, after) => {
        const text = `${'We met. '.repeat(before)}It is the wrong hand.${' We met.'.repeat(after)}`
        expect(checkWording(text)).toMatchObject([{ ruleId: 'wrong-hand', start: text.indexOf('wrong') }])
      }),
    )
  })

  it('reads a long letter of repeated near-misses without grinding', () => {
    const text = 'change the hand the hand over to the child still using not a good hand '.repeat(300)
    const started = performance.now()
    checkWording(text)
    expect(performance.now() - started).toBeLessThan(2000)
  })

  it('gives every rule a reason and something to write instead, itself free of hits', () => {
    for (const rule of wordingRules) {
      expect(rule.why).not.toBe('')
      expect(rule.instead.length).toBeGreaterThan(0)
      expect(checkWording(rule.instead.join('. '))).toEqual([])
    }
  })
})

describe('bareScores', () => {
  it.each([
    ['The LQ was −88.2.', ['LQ was −88.2']],
    ['Her laterality quotient is -20.', ['laterality quotient is -20']],
    ['T 34.6 became T 54.4.', ['T 34.6', 'T 54.4']],
    ['His T-score is 54.4. Well done.', ['T-score is 54.4']],
    ['The skill index: −12.5', ['skill index: −12.5']],
  ])('finds a number without meaning in "%s"', (text, expected) => {
    expect(bareScores(text).map((hit) => hit.text)).toEqual(expected)
  })

  it.each([
    'The LQ was −88.2. This means that Mateo chose the left hand for almost everything we asked about.',
    'His T-score is 54.4, which means he did a little better than we hoped.',
    'He read 7 of 10 words, it was 4.',
    'He wears a T-shirt.',
    'We met on 3 Mar 2026 at 14:05.',
    'Year 4, class T 3',
    'The quotient is explained on the next page.',
  ])('lets "%s" stand', (text) => {
    expect(bareScores(text)).toEqual([])
  })
})

describe('namesOfOthers', () => {
  it.each([
    ['Axel sat beside her.', ['Axel'], ['Axel']],
    ['We used Axel’s scissors.', ['Axel'], ['Axel']],
    ['AXEL LINDQVIST-SHAW', ['Axel Lindqvist-Shaw'], ['AXEL LINDQVIST-SHAW']],
    ['Axel\nLindqvist-Shaw', ['Axel Lindqvist-Shaw', 'Axel'], ['Axel\nLindqvist-Shaw']],
    ['Ine\u0301s came too.', ['Inés'], ['Ine\u0301s']],
    ['Anne and Hana', ['Ann', 'Hana'], ['Hana']],
    ['Well, will you come?', ['Will'], []],
    ['Mei-Lin writes', ['Mei-Lin', 'Mei'], ['Mei-Lin']],
    ['Idris (8) is here', ['Idris', ''], ['Idris']],
    ['A plain letter', ['A', 'x'], []],
    ["D’Arcy and D'Arcy", ["D'Arcy"], ['D’Arcy', "D'Arcy"]],
    ['Anything', ['.*'], []],
  ])('%s', (text, names, expected) => {
    expect(namesOfOthers(text, names).map((hit) => hit.text)).toEqual(expected)
  })
})
