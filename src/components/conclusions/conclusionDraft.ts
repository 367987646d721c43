import {
  conclusionPlanLabels,
  conclusionTextLabels,
  conclusionTexts,
  confidenceLabels,
  evidenceKindLabels,
  evidenceKinds,
  handPreferenceLabels,
  type ConclusionContent,
  type ConclusionState,
  type EvidenceChoice,
  type EvidenceKind,
  type EvidenceLink,
} from '@shared/conclusions.ts'

export const conclusionStateTone = (state: ConclusionState) =>
  (({ draft: 'pollen', awaiting_countersignature: 'rain', signed: 'leaf' }) as const)[state]

/** A copy to write in: the view around it stays behind. */
export const draftOf = (content: ConclusionContent): ConclusionContent => ({
  handPreference: content.handPreference,
  confidence: content.confidence,
  evidence: content.evidence.map(({ kind, id }) => ({ kind, id })),
  strengths: content.strengths,
  mattersToChild: content.mattersToChild,
  reasoning: content.reasoning,
  plan: content.plan,
  planDetail: content.planDetail,
  aboutDisagreements: content.aboutDisagreements,
})

const isSame = (one: EvidenceLink) => (other: EvidenceLink) => one.kind === other.kind && one.id === other.id

/** Whether a piece of evidence is among those chosen. */
export const isChosen = (chosen: readonly EvidenceLink[], link: EvidenceLink): boolean =>
  chosen.some(isSame(link))

/** The chosen evidence with one piece more or less; nothing stands twice. */
export const withEvidence = (
  chosen: readonly EvidenceLink[],
  { kind, id }: EvidenceLink,
  yes: boolean,
): EvidenceLink[] => {
  const others = chosen.filter((other) => !isSame({ kind, id })(other))
  return yes ? [...others, { kind, id }] : others
}

export interface EvidenceGroup {
  kind: EvidenceKind
  label: string
  /** Newest first. */
  choices: EvidenceChoice[]
}

/** What can be chosen, by kind in a fixed order, newest first; kinds with nothing are left out. */
export const evidenceGroups = (choices: readonly EvidenceChoice[]): EvidenceGroup[] =>
  evidenceKinds
    .map((kind) => ({
      kind,
      label: evidenceKindLabels[kind],
      choices: choices
        .filter((choice) => choice.kind === kind)
        .toSorted((one, other) => other.on.localeCompare(one.on)),
    }))
    .filter((group) => group.choices.length > 0)

/** Chosen evidence that is no longer offered, because something newer has taken its place or it was taken back. */
export const lostEvidence = (
  chosen: readonly EvidenceLink[],
  choices: readonly EvidenceChoice[],
): EvidenceLink[] => chosen.filter((link) => !isChosen(choices, link))

const evidenceWords = (content: ConclusionContent, choices: readonly EvidenceChoice[]): string => {
  const known = choices.filter((choice) => isChosen(content.evidence, choice))
  const lost = lostEvidence(content.evidence, choices).length
  const words = known.map((choice) => choice.words)
  return [...words, ...(lost > 0 ? [`${lost} no longer in the record`] : [])].toSorted().join('\n')
}

/** The parts in which two drafts differ, both in full and in words. */
export function differingParts(
  mine: ConclusionContent,
  theirs: ConclusionContent,
  choices: readonly EvidenceChoice[],
): { label: string; mine: string; theirs: string }[] {
  const chosen = (content: ConclusionContent) =>
    [
      content.handPreference ? handPreferenceLabels[content.handPreference] : 'Hand preference not chosen',
      content.confidence ? confidenceLabels[content.confidence] : 'How sure: not chosen',
      content.plan ? conclusionPlanLabels[content.plan] : 'Plan not chosen',
    ].join('\n')
  const parts = [
    { label: 'What was chosen', mine: chosen(mine), theirs: chosen(theirs) },
    {
      label: 'What it rests on',
      mine: evidenceWords(mine, choices),
      theirs: evidenceWords(theirs, choices),
    },
    ...conclusionTexts.map((text) => ({
      label: conclusionTextLabels[text],
      mine: mine[text] ?? '',
      theirs: theirs[text] ?? '',
    })),
  ]
  return parts.filter((part) => part.mine !== part.theirs)
}
