import { compareDays, formatDay, type Day } from './days.ts'
import type { GoalFacts, ProgressFacts, SchoolFacts } from './letterFacts.ts'
import { sampleChanges } from './letterMeasures.ts'
import type { LetterFact, LetterSection, LetterSectionId } from './letters.ts'
import { sessionTypes, type SessionType } from './sessionNotes.ts'

/** Name and version kept with every letter made from this template. */
export const progressLetterTemplate = 'progress/1'

/** A family can take up three things at once (clinic rule). */
export const maximumHomeItems = 3

export interface AssembledLetter {
  salutation: string
  sections: LetterSection[]
  facts: LetterFact[]
}

interface Part {
  heading: string
  paragraphs: string[]
  facts: Omit<LetterFact, 'section'>[]
}

/** A place the author must fill or delete. The checker lets no letter out with one in it. */
const gap = (prompt: string) => `[${prompt.replaceAll('[', '(').replaceAll(']', ')')}]`

const bullets = (items: readonly string[]) => items.map((item) => `- ${item}`).join('\n')

/** Ends a text taken from the record like a sentence, so that the next one does not run into it. */
const sentence = (text: string) => (/[.!?…]["’”)]?$/.test(text.trim()) ? text.trim() : `${text.trim()}.`)

const joinNames = (names: readonly string[]) =>
  names.length < 2 ? names.join('') : `${names.slice(0, -1).join(', ')} and ${names.at(-1)}`

/**
 * Assembles version 1 of the parent's progress letter from the record. Nothing is made up: a section whose facts are
 * missing holds a prompt in square brackets instead, and every fact used is listed with its source.
 */
export function draftProgressLetter(facts: ProgressFacts): AssembledLetter {
  const parts: Record<LetterSectionId, Part> = {
    opening: opening(facts),
    strengths: strengths(facts),
    work: work(facts),
    changes: changes(facts),
    goals: goals(facts),
    home: home(facts),
    school: school(facts),
    next: next(facts),
    wrong: wrong(facts),
  }
  const entries = Object.entries(parts) as [LetterSectionId, Part][]
  return {
    salutation: `Dear ${facts.addressedTo.length > 0 ? joinNames(facts.addressedTo) : `family of ${facts.childName}`}`,
    sections: entries.map(([id, part]) => ({
      id,
      heading: part.heading,
      text: part.paragraphs.join('\n\n'),
    })),
    facts: entries.flatMap(([section, part]) => part.facts.map((fact) => ({ section, ...fact }))),
  }
}

const sessionNouns: Record<SessionType, [one: string, many: string]> = {
  assessment: ['assessment', 'assessments'],
  session: ['therapy session', 'therapy sessions'],
  review: ['review', 'reviews'],
  school_visit: ['visit to school', 'visits to school'],
  phone: ['phone call', 'phone calls'],
  video: ['video call', 'video calls'],
}

function opening({ childName, author, clinicName, sessions }: ProgressFacts): Part {
  const lines = sessionTypes.flatMap((type) => {
    const days = sessions.filter((session) => session.type === type).map((session) => session.heldOn)
    const [first, ...later] = days.toSorted(compareDays)
    if (first === undefined) return []
    const last = later.at(-1)
    const [one, many] = sessionNouns[type]
    return last === undefined
      ? [`1 ${one}, on ${formatDay(first)}`]
      : [`${days.length} ${many}, from ${formatDay(first)} to ${formatDay(last)}`]
  })
  return {
    heading: 'When we met',
    paragraphs: [
      `I am ${author} from ${clinicName}. I am ${childName}’s occupational therapist. This letter tells you how ${childName} is getting on.`,
      lines.length === 0
        ? gap('Write when you met, and who was there.')
        : `So far we have had:\n${bullets(lines)}`,
    ],
    facts: lines.map((text) => ({ text, source: 'Session notes' })),
  }
}

function strengths({ childName, strengths: found, childWords }: ProgressFacts): Part {
  return {
    heading: `What ${childName} enjoys and does well`,
    paragraphs: [
      found.length === 0
        ? gap(`Write at least two things ${childName} enjoys or does well.`)
        : bullets(found.map(({ text }) => sentence(text))),
      ...childWords.map(({ text }) => `In ${childName}’s own words: “${text.trim()}”`),
    ],
    facts: [...found, ...childWords],
  }
}

function work({ childName, goals: set }: ProgressFacts): Part {
  const touched = set.filter((goal) => goal.sessions > 0)
  const lines = touched.map((goal) => sentence(goal.activity))
  return {
    heading: 'What we worked on',
    paragraphs:
      lines.length === 0
        ? [gap(`Write what you and ${childName} worked on.`)]
        : ['In our sessions we worked on:', bullets(lines)],
    facts: touched.map((goal) => ({
      text: goal.activity,
      source: `Goal of ${formatDay(goal.setOn)}, in ${goal.sessions} session ${goal.sessions === 1 ? 'note' : 'notes'}`,
    })),
  }
}

function changes({ childName, samples }: ProgressFacts): Part {
  const found = sampleChanges(childName, samples)
  return {
    heading: 'What has changed',
    paragraphs:
      found === null
        ? [gap(`Write what ${childName} can do now that was harder before.`)]
        : [found.intro, bullets(found.lines.map((line) => line.text))],
    facts: found === null ? [] : found.lines,
  }
}

/** How a level stands to what was hoped for, in words instead of a number. */
const standing = (level: number) => {
  if (level <= -2) return 'This is where we began.'
  if (level === -1) return 'This is on the way to what we hoped for.'
  if (level === 0) return 'This is what we hoped for.'
  return level === 1 ? 'This is a little more than we hoped for.' : 'This is much more than we hoped for.'
}

const goalParagraph = (childName: string, goal: GoalFacts) =>
  [
    `${sentence(goal.activity)} ${childName} said: “${goal.childVoice.trim()}”`,
    bullets([
      `At the start: ${sentence(goal.baselineText)}`,
      goal.latest === null
        ? 'We have not looked at this again yet.'
        : `On ${formatDay(goal.latest.ratedOn)}: ${sentence(goal.latest.text)} ${standing(goal.latest.level)}`,
    ]),
  ].join('\n')

function goals({ childName, goals: set }: ProgressFacts): Part {
  return {
    heading: 'Goals and where they stand',
    paragraphs:
      set.length === 0
        ? [gap(`Write the goals you have agreed with ${childName}, or delete this section.`)]
        : set.map((goal) => goalParagraph(childName, goal)),
    facts: set.map((goal) => ({
      text:
        goal.latest === null
          ? `${goal.activity}: ${goal.baselineText}`
          : `${goal.activity}: ${goal.baselineText} → ${goal.latest.text}`,
      source:
        goal.latest === null
          ? `Goal of ${formatDay(goal.setOn)}, not rated again`
          : `Goal of ${formatDay(goal.setOn)}, rated on ${formatDay(goal.latest.ratedOn)}`,
    })),
  }
}

const planExcerptLength = 300

function home({ home: found, lastPlan }: ProgressFacts): Part {
  const items = found.slice(0, maximumHomeItems)
  const heading = 'What helps at home'
  if (items.length > 0) {
    return {
      heading,
      paragraphs: [
        bullets(
          items.map(
            ({ text, minutes }) => sentence(text) + (minutes === null ? '' : ` About ${minutes} minutes.`),
          ),
        ),
      ],
      facts: items.map(({ text, source }) => ({ text, source })),
    }
  }
  const prompt = 'Write up to three things to practise at home, with the minutes for each.'
  if (lastPlan === null) return { heading, paragraphs: [gap(prompt)], facts: [] }
  const plan = lastPlan.text.trim().replace(/\s+/g, ' ')
  const excerpt = plan.length > planExcerptLength ? `${plan.slice(0, planExcerptLength).trimEnd()}…` : plan
  return {
    heading,
    // A plan is written for colleagues. The author sees it here and says it in the family's words.
    paragraphs: [gap(`${prompt} The plan of ${formatDay(lastPlan.heldOn)} says: ${excerpt}`)],
    facts: [{ text: excerpt, source: `Plan in the session note of ${formatDay(lastPlan.heldOn)}` }],
  }
}

const replyWords: Record<Exclude<SchoolFacts['reply'], null>, string> = {
  done: ' The teacher says this is done.',
  trying: ' The teacher is trying this.',
  cannot: ' This is not possible there just now, and we are looking for another way.',
}

function school({ childName, schoolAdvice }: ProgressFacts): Part {
  return {
    heading: 'What school is doing',
    paragraphs:
      schoolAdvice.length === 0
        ? [gap('Write what school will do, or delete this section.')]
        : [
            `We have given ${childName}’s school this advice:`,
            bullets(
              schoolAdvice.map(
                ({ text, reply }) => sentence(text) + (reply === null ? '' : replyWords[reply]),
              ),
            ),
          ],
    facts: schoolAdvice.map(({ text, source }) => ({ text, source })),
  }
}

/** The record plans a review; a day and hour are agreed by appointment, so the letter promises no more. */
export const nextVisitSentence = (on: Day): string => `We plan to meet again around ${formatDay(on)}.`

function next({ nextVisitOn, clinicPhone }: ProgressFacts): Part {
  return {
    heading: 'Our next visit and who to call',
    paragraphs: [
      nextVisitOn === null
        ? gap('Write when you will meet next, or that no visit is planned and how to ask for one.')
        : nextVisitSentence(nextVisitOn),
      clinicPhone === null
        ? gap('Write the phone number to call.')
        : `If you need to change the day, or have a question, please call us on ${clinicPhone}.`,
    ],
    facts:
      nextVisitOn === null ? [] : [{ text: formatDay(nextVisitOn), source: 'Next review on the record' }],
  }
}

const wrong = ({ childName }: ProgressFacts): Part => ({
  heading: 'If something here is not right',
  paragraphs: [
    `You know ${childName} best. If we have got something wrong, please tell us. We will put it right and send you a new letter.`,
  ],
  facts: [],
})
