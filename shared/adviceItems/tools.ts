import { writesWellAboveLine, type AdviceFacts } from '../adviceFacts.ts'
import { whenTrue, type AdviceItem } from '../adviceItem.ts'

const healthService = 'Provincial health-service page on left-handed children, Canada'
const districtTherapists = 'School-district therapists’ strategies for left-handed pupils, 2010'
const teachers = 'Teachers’ guidance, 1999 and 2019, and a primary school’s page'
const therapySheets = 'Children’s therapy handwriting sheets'
const severalSources = 'Agreed by several practice sources'

const cutsLeft = ({ cuttingHand }: AdviceFacts): string | null =>
  cuttingHand === 'left' ? 'the child cuts with the left hand' : null

const sharesScissors = ({ cuttingHand, sharesScissorPot }: AdviceFacts): string | null =>
  cuttingHand === 'left' && sharesScissorPot === true ? 'left-handed scissors are kept in a shared pot' : null

const cutsJaggedly = ({ cuttingHand, cuttingStage }: AdviceFacts): string | null =>
  cuttingHand === 'left' && cuttingStage === 'jagged' ? 'cut edges come out jagged' : null

const cutsWellWithRight = ({ writingHand, cuttingHand, cuttingStage }: AdviceFacts): string | null =>
  writingHand === 'left' && cuttingHand === 'right' && cuttingStage === 'steady'
    ? 'the child writes with the left hand and cuts steadily with the right'
    : null

const startsCutting = ({ cuttingStage }: AdviceFacts): string | null =>
  cuttingStage === 'starting' ? 'the child is starting to cut' : null

const scissorRules = [cutsLeft, sharesScissors, cutsJaggedly, cutsWellWithRight, startsCutting]

const smudges = ({ smudge }: AdviceFacts): string | null =>
  smudge === 'light' || smudge === 'heavy' ? 'the hand smudges the writing' : null

/** Scissors, rulers, pens, books and boards. Ages are starting points: the adult beside the child judges. */
export const toolItems: readonly AdviceItem[] = [
  {
    id: 'T01',
    text: 'Give real left-handed scissors, with the blades the other way round. “Either-hand” scissors do not exist.',
    because: 'With the blades reversed a left hand sees the line and presses the blades together.',
    audiences: ['teacher', 'parent'],
    ageFrom: 3,
    ageTo: 14,
    caution: 'Check the blades, not the handles.',
    grade: 'professional_consensus',
    source: healthService,
    needsLeftWriter: false,
    leftToRightOnly: false,
    offeredFor: cutsLeft,
  },
  {
    id: 'T02',
    text: 'Mark the left-handed scissors and keep them apart: two or three pairs for a class.',
    because: 'Cutting with them in the right hand loosens the blades.',
    audiences: ['teacher'],
    ageFrom: 4,
    ageTo: 14,
    caution: 'Two or three pairs for a class.',
    grade: 'common_practice',
    source: severalSources,
    needsLeftWriter: false,
    leftToRightOnly: false,
    offeredFor: sharesScissors,
  },
  {
    id: 'T03',
    text: 'Cutting with the left hand, go round a shape clockwise while the right hand turns the paper.',
    because: 'The waste falls away from the line and the hand stays in a comfortable place.',
    audiences: ['teacher', 'parent', 'child'],
    ageFrom: 4,
    ageTo: 10,
    caution: 'Thumbs up in both hands; an adult close by.',
    grade: 'common_practice',
    source: teachers,
    needsLeftWriter: false,
    leftToRightOnly: false,
    offeredFor: cutsJaggedly,
  },
  {
    id: 'T04',
    text: 'A child who already cuts well with the right hand may carry on doing so.',
    because: 'Different hands for different jobs are fine when each job keeps its hand.',
    audiences: ['teacher', 'parent'],
    ageFrom: 4,
    ageTo: 14,
    caution: 'Therapists differ here: it is the child’s choice.',
    grade: 'professional_consensus',
    source: `${districtTherapists}; a family-hub page on hand dominance`,
    needsLeftWriter: true,
    leftToRightOnly: false,
    offeredFor: cutsWellWithRight,
  },
  {
    id: 'T05',
    text: 'Scissors rules: sit to cut, carry them closed, hand them over handles first, an adult near.',
    because: 'A few fixed habits keep everyone’s fingers and faces safe.',
    audiences: ['teacher', 'parent', 'child'],
    ageFrom: 3,
    ageTo: 10,
    caution: 'This is about safety, not skill: choose the job by what the child can do.',
    grade: 'common_practice',
    source: 'Therapists’ trade knowledge, from memory; the school’s own safety rules come first',
    needsLeftWriter: false,
    leftToRightOnly: false,
    offeredFor: (facts) => {
      const fact = scissorRules.map((rule) => rule(facts)).find((words) => words !== null)
      return fact === undefined ? null : `scissors are in use: ${fact}`
    },
  },
  {
    id: 'T06',
    text: 'Match the job to the stage: snips at about 2½ to 3, lines at about 3½, simple shapes at about 4½ to 5.',
    because: 'A job that fits goes well, and cutting that goes well gets practised.',
    audiences: ['parent', 'teacher'],
    ageFrom: 3,
    ageTo: 6,
    caution: 'Children differ widely; an adult stays beside the child.',
    grade: 'common_practice',
    source: 'Two therapists’ timelines of scissor skills',
    needsLeftWriter: false,
    leftToRightOnly: false,
    offeredFor: startsCutting,
  },
  {
    id: 'T07',
    text: 'With a ruler: the right hand presses, and the line is drawn from right to left. Or use a ruler numbered from the right.',
    because: 'The left hand then pulls the pencil and does not cover the numbers.',
    audiences: ['teacher', 'child'],
    ageFrom: 7,
    ageTo: 14,
    caution: 'Reading a scale from the right may need practice.',
    grade: 'common_practice',
    source: severalSources,
    needsLeftWriter: true,
    leftToRightOnly: false,
    offeredFor: ({ rulerTrouble }) => whenTrue(rulerTrouble, 'the ruler slips or the hand covers it'),
  },
  {
    id: 'T08',
    text: 'Offer a left-handed, an electric or a fixed crank sharpener.',
    because: 'An ordinary one turns against the left hand.',
    audiences: ['teacher', 'parent', 'child'],
    ageFrom: 5,
    ageTo: 14,
    caution: 'An ordinary one can be used and feels odd. Blades stay with an adult.',
    grade: 'professional_consensus',
    source: healthService,
    needsLeftWriter: true,
    leftToRightOnly: false,
    offeredFor: ({ sharpenerTrouble }) => whenTrue(sharpenerTrouble, 'sharpening pencils takes effort'),
  },
  {
    id: 'T09',
    text: 'Try quick-drying ink: several pens, two weeks each.',
    because: 'The hand follows the ink across the page and smears what is still wet.',
    audiences: ['teacher', 'parent', 'child'],
    ageFrom: 8,
    ageTo: 14,
    caution: 'The child picks the pen.',
    grade: 'professional_consensus',
    source: `${healthService}; ${therapySheets}`,
    needsLeftWriter: true,
    leftToRightOnly: false,
    offeredFor: smudges,
  },
  {
    id: 'T10',
    text: 'Try two pencils: a soft lead for a light young hand, a harder one where the writing smears.',
    because: 'The right lead saves effort, or keeps the page clean; trying both shows which matters more.',
    audiences: ['teacher', 'parent'],
    ageFrom: 4,
    ageTo: 10,
    caution: 'Sources disagree on the lead: try both.',
    grade: 'common_practice',
    source: teachers,
    needsLeftWriter: false,
    leftToRightOnly: false,
    offeredFor: (facts) => smudges(facts) ?? whenTrue(facts.paperTears, 'the paper tears under the pencil'),
  },
  {
    id: 'T11',
    text: 'Use loose paper or a pad bound at the top, or turn a pad back to front.',
    because: 'Rings on the left lie under the arm that writes.',
    audiences: ['teacher', 'parent', 'child'],
    ageFrom: 6,
    ageTo: 14,
    caution: 'Put something stiff under loose sheets.',
    grade: 'professional_consensus',
    source: healthService,
    needsLeftWriter: true,
    leftToRightOnly: false,
    offeredFor: ({ ringsUnderArm }) => whenTrue(ringsUnderArm, 'the rings of the pad lie under the arm'),
  },
  {
    id: 'T12',
    text: 'On a wipe-clean board: turn the board clockwise, or use paper.',
    because: 'The hand wipes away what it has just written.',
    audiences: ['teacher'],
    ageFrom: 4,
    ageTo: 9,
    caution: 'Do not count wiped work as not done.',
    grade: 'common_practice',
    source: severalSources,
    needsLeftWriter: true,
    leftToRightOnly: true,
    offeredFor: ({ usesWipeBoard }) => whenTrue(usesWipeBoard, 'wipe-clean boards are used in class'),
  },
  {
    id: 'T13',
    text: 'Offer a sloped surface to bring the work up.',
    because: 'The back stays upright and the wrist lies easier on a slope.',
    audiences: ['teacher', 'parent'],
    ageFrom: 6,
    ageTo: 14,
    caution: 'Check the height against the shoulder, and stop it sliding.',
    grade: 'professional_consensus',
    source: therapySheets,
    needsLeftWriter: false,
    leftToRightOnly: false,
    offeredFor: (facts) => {
      if (facts.slumps === true) return 'the child slumps over the desk'
      return facts.wristPosture === 'above_line' && !writesWellAboveLine(facts)
        ? 'the hand lies above the line'
        : null
    },
  },
]
