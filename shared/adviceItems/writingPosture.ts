import { writesWellAboveLine } from '../adviceFacts.ts'
import { measure, whenTrue, type AdviceItem } from '../adviceItem.ts'
import { gripLabels, matureGrips } from '../writingObservations.ts'

const districtTherapists = 'School-district therapists’ strategies for left-handed pupils, 2010'
const teachers = 'Teachers’ guidance, 1999 and 2019, and a primary school’s page'
const therapySheets = 'Children’s therapy handwriting sheets'

/** Page, arm, wrist and grip. Distances and angles are starting points: sources differ and the child fine-tunes. */
export const writingPostureItems: readonly AdviceItem[] = [
  {
    id: 'W01',
    text: 'Put the page to the left of the middle of the body.',
    because: 'The left arm then has room to move along the line instead of running into the body.',
    audiences: ['teacher', 'parent', 'child'],
    ageFrom: 4,
    ageTo: 14,
    caution: 'Shift the page, not the child: the trunk stays upright.',
    grade: 'professional_consensus',
    source: `${districtTherapists}; ${teachers}`,
    needsLeftWriter: true,
    leftToRightOnly: true,
    offeredFor: ({ paperOffsetCm }) => {
      if (paperOffsetCm === null || paperOffsetCm <= -3) return null
      if (paperOffsetCm > 3) return `the page sits right of the middle (${measure(paperOffsetCm, 'cm')})`
      return 'the page sits in front of the middle of the body'
    },
  },
  {
    id: 'W02',
    text: 'Turn the page clockwise, so that its edge lies along the left forearm. Start at about 30° and try between 20° and 45°.',
    because: 'The child sees what is written and the wrist can stay straight.',
    audiences: ['teacher', 'parent', 'child'],
    ageFrom: 4,
    ageTo: 14,
    caution: 'Let the child fine-tune the turn: sources differ on the degrees.',
    grade: 'professional_consensus',
    source: `${districtTherapists}; ${teachers}; ${therapySheets}`,
    needsLeftWriter: true,
    leftToRightOnly: true,
    offeredFor: ({ paperTiltDegrees }) => {
      if (paperTiltDegrees === null || paperTiltDegrees >= 15) return null
      if (paperTiltDegrees < 0)
        return `the page is turned the other way (${measure(-paperTiltDegrees, '°')} anticlockwise)`
      return `the page is hardly turned (${measure(paperTiltDegrees, '°')})`
    },
  },
  {
    id: 'W03',
    text: 'Let the right hand hold the page still at its middle or right edge, not under the line.',
    because: 'A page that stays put lets the left hand write without chasing it.',
    audiences: ['teacher', 'child'],
    ageFrom: 4,
    ageTo: 14,
    caution: null,
    grade: 'professional_consensus',
    source: teachers,
    needsLeftWriter: true,
    leftToRightOnly: false,
    offeredFor: ({ otherHandSteadies }) => {
      if (otherHandSteadies === 'partly') return 'the right hand steadies the page only some of the time'
      return otherHandSteadies === 'no' ? 'the right hand does not steady the page' : null
    },
  },
  {
    id: 'W04',
    text: 'Slide the page up as the lines fill, and keep the elbow where it is.',
    because: 'Near the bottom of a page the wrist bends and tires unless the page moves.',
    audiences: ['teacher', 'child'],
    ageFrom: 5,
    ageTo: 14,
    caution: 'Needs a clear desk in front of the page.',
    grade: 'professional_consensus',
    source: therapySheets,
    needsLeftWriter: true,
    leftToRightOnly: true,
    offeredFor: ({ wristBendsLowOnPage }) => whenTrue(wristBendsLowOnPage, 'the wrist bends low on the page'),
  },
  {
    id: 'W05',
    text: 'Hold the pencil about 2 to 3.5 cm from the tip. A small band or dot can show the place.',
    because: 'The letters stay in view and the hand stays off the fresh ink.',
    audiences: ['teacher', 'parent', 'child'],
    ageFrom: 5,
    ageTo: 14,
    caution: 'Show it once and leave the mark to remind: no nagging.',
    grade: 'professional_consensus',
    source: `${teachers}; ${therapySheets}`,
    needsLeftWriter: true,
    leftToRightOnly: true,
    offeredFor: ({ fingerToTipMm, smudge }) => {
      if (fingerToTipMm !== null && fingerToTipMm < 20)
        return `the fingers are close to the tip (${measure(fingerToTipMm, 'mm')})`
      return smudge === 'light' || smudge === 'heavy' ? 'the hand smudges the writing' : null
    },
  },
  {
    id: 'W06',
    text: 'Leave a comfortable, grown-up pencil grasp alone, whichever of the four it is. Three fingers are not required.',
    because: 'With any of these four grasps children write just as fast and just as clearly.',
    audiences: ['teacher', 'parent', 'therapist'],
    ageFrom: 6,
    ageTo: 14,
    caution: 'Look again if the hand hurts.',
    grade: 'peer_reviewed',
    source: 'Schwellnus et al. 2012 and 2013; Koziatek & Powell 2003 (abstracts)',
    needsLeftWriter: false,
    leftToRightOnly: false,
    offeredFor: ({ grip }) =>
      grip !== null && matureGrips.includes(grip)
        ? `the grasp is a mature one (${gripLabels[grip].toLowerCase()})`
        : null,
  },
  {
    id: 'W07',
    text: 'For a new writer: try the hand under the line with the wrist fairly straight. Turn the page first, then look at the hand.',
    because: 'Early on, the hand under the line keeps the words in sight and is easy to learn.',
    audiences: ['teacher', 'parent', 'child'],
    ageFrom: 4,
    ageTo: 7,
    caution: 'Page angle first, hand second; offer it, do not insist.',
    grade: 'professional_consensus',
    source: `${districtTherapists}; ${teachers}`,
    needsLeftWriter: true,
    leftToRightOnly: true,
    offeredFor: ({ wristPosture }) =>
      wristPosture === 'above_line' ? 'the hand lies above the line and the child is a new writer' : null,
  },
  {
    id: 'W08',
    text: 'Leave the hand above the line: this child writes well that way.',
    because: 'A settled writer with clear letters and no pain gains nothing from moving the hand.',
    audiences: ['teacher', 'parent', 'therapist'],
    ageFrom: 8,
    ageTo: 14,
    caution: 'Look again if pain comes.',
    grade: 'peer_reviewed',
    source:
      'Bryson & MacDonald 1984; Szeligo et al. 2003 (abstracts). The ages of the writers studied are not given in the abstracts read',
    needsLeftWriter: true,
    leftToRightOnly: true,
    offeredFor: (facts) =>
      writesWellAboveLine(facts) && facts.legiblePercent !== null
        ? `the hand lies above the line, nothing hurts and ${Math.round(facts.legiblePercent)}% of the letters are readable`
        : null,
  },
  {
    id: 'W09',
    text: 'Try it with the end of the pencil pointing toward the left elbow rather than the shoulder.',
    because: 'It is a simple cue that lets a curled wrist open out.',
    audiences: ['teacher', 'child'],
    ageFrom: 5,
    ageTo: 10,
    caution: 'A cue to try, not a rule.',
    grade: 'professional_consensus',
    source: districtTherapists,
    needsLeftWriter: true,
    leftToRightOnly: true,
    offeredFor: (facts) =>
      facts.wristExtensionDegrees !== null && facts.wristExtensionDegrees < 0 && !writesWellAboveLine(facts)
        ? `the wrist is curled inwards (about ${measure(-facts.wristExtensionDegrees, '°')})`
        : null,
  },
  {
    id: 'W10',
    text: 'Help the hand to hold more lightly: a soft lead or an easy-flow pen, and the game "can someone slide it out?".',
    because: 'Pressing hard tires the hand and slows the writing.',
    audiences: ['teacher', 'parent', 'child'],
    ageFrom: 5,
    ageTo: 14,
    caution: 'Check the height of the table too, and whether the child is worried.',
    grade: 'common_practice',
    source: teachers,
    needsLeftWriter: false,
    leftToRightOnly: false,
    offeredFor: ({ pressure }) => (pressure === 'heavy' ? 'the child presses hard' : null),
  },
  {
    id: 'W11',
    text: 'Accept upright or backward-leaning letters, and do not mark them down.',
    because: 'Pushing the pencil makes letters stand up or lean back; they are just as readable.',
    audiences: ['teacher'],
    ageFrom: 6,
    ageTo: 14,
    caution: 'Agree it with the school’s marking policy.',
    grade: 'professional_consensus',
    source: therapySheets,
    needsLeftWriter: true,
    leftToRightOnly: true,
    offeredFor: ({ slantRemarked }) =>
      whenTrue(slantRemarked, 'the slant of the letters has been remarked on'),
  },
]
