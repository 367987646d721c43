import type { ConclusionEvidence, ConclusionView, SignedEvidence } from '../../shared/conclusions.ts'
import type { ChildAccess } from '../access/childAccess.ts'
import {
  canChangeConclusion,
  canCountersignConclusion,
  canReplaceConclusion,
  hasReport,
} from '../policies/conclusions.ts'
import type { ConclusionRecord } from '../queries/conclusions.ts'

const presentEvidence = (evidence: SignedEvidence): ConclusionEvidence => ({
  age: evidence.age,
  lateralLine: evidence.lateralLine,
  evidence: evidence.evidence.map(({ kind, id, words, on }) => ({ kind, id, words, on })),
  contradictions: evidence.contradictions,
  statements: evidence.statements,
  citations: evidence.citations,
})

export const presentConclusion = (conclusion: ConclusionRecord, access: ChildAccess): ConclusionView => ({
  id: conclusion.id,
  childId: conclusion.childId,
  author: conclusion.author,
  state: conclusion.state,
  content: {
    handPreference: conclusion.content.handPreference,
    confidence: conclusion.content.confidence,
    evidence: conclusion.content.evidence.map(({ kind, id }) => ({ kind, id })),
    strengths: conclusion.content.strengths,
    mattersToChild: conclusion.content.mattersToChild,
    reasoning: conclusion.content.reasoning,
    plan: conclusion.content.plan,
    planDetail: conclusion.content.planDetail,
    aboutDisagreements: conclusion.content.aboutDisagreements,
  },
  evidence: conclusion.evidence && presentEvidence(conclusion.evidence),
  signedAt: conclusion.signedAt?.toISOString() ?? null,
  countersignedAt: conclusion.countersignedAt?.toISOString() ?? null,
  countersignedBy: conclusion.countersignedBy,
  replacesId: conclusion.replacesId,
  replacedById: conclusion.replacedById,
  version: conclusion.version,
  can: {
    change: canChangeConclusion(access, conclusion),
    sign: canChangeConclusion(access, conclusion),
    countersign: canCountersignConclusion(access, conclusion),
    replace: canReplaceConclusion(access, conclusion),
    discard: canChangeConclusion(access, conclusion),
    report: hasReport(conclusion),
  },
})
