import type { Confidence, ConclusionPlan, EvidenceKind, HandPreference } from '../../../shared/conclusions.ts'
import type { DemoConclusion } from './assessmentTypes.ts'
import { children } from './children.ts'
import type { Offset } from './demoTypes.ts'
import type { StaffKey } from './people.ts'

interface Parts {
  matters: string
  because: string
  plan: [plan: ConclusionPlan, words: string]
  disagreements?: string
  restsOn?: EvidenceKind[]
  signed?: boolean
  countersigned?: DemoConclusion['countersigned']
  replacesEarlier?: boolean
}

const usualGround: EvidenceKind[] = ['questionnaire', 'measure', 'history', 'writing_observation']

const strengthsOf = (number: number): string => {
  const strengths = children.find((child) => child.number === number)?.strengths
  if (!strengths) throw new Error(`Child ${number} of the demo has no strengths to begin with`)
  return strengths
}

type Write = (
  child: number,
  writtenDay: Offset,
  preference: HandPreference,
  confidence: Confidence,
  parts: Parts,
) => DemoConclusion

/** Conclusions of one therapist. What goes well is what stands on the record; the rest is written for the child. */
export const conclusionsBy =
  (by: StaffKey): Write =>
  (
    child,
    writtenDay,
    handPreference,
    confidence,
    { matters, because, plan, disagreements, restsOn = usualGround, ...rest },
  ) => ({
    child,
    by,
    writtenDay,
    restsOn,
    content: {
      handPreference,
      confidence,
      strengths: strengthsOf(child),
      mattersToChild: matters,
      reasoning: because,
      plan: plan[0],
      planDetail: plan[1],
      aboutDisagreements: disagreements ?? null,
    },
    signed: true,
    countersigned: null,
    replacesEarlier: false,
    ...rest,
  })
