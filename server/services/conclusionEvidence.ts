import { evidenceChoice, reportCautions, type EvidenceRow } from '../../shared/conclusionEvidence.ts'
import type { ConclusionContent, EvidenceChoice, EvidenceLink } from '../../shared/conclusions.ts'
import { ageInYears } from '../../shared/days.ts'
import { handProfileOf, withoutDetails } from '../../shared/handProfile.ts'
import { handContradictions, statementText } from '../../shared/handStatements.ts'
import type { LateralLineRow } from '../../shared/lateralLine.ts'
import type { ChildAccess } from '../access/childAccess.ts'
import type { Tx } from '../dataSource.ts'
import { findChildFacts } from '../queries/childFacts.ts'
import { listLockedHandEvidence } from '../queries/handEvidence.ts'
import { clinicToday, readSettings } from './settings.ts'

/** What the measures of a child say, side by side. */
export interface HandFindings {
  lateralLine: LateralLineRow[]
  statements: string[]
  citations: string[]
  cautions: string[]
  /** Whole years today. */
  ageYears: number
}

const each = (texts: readonly string[]) => [...new Set(texts)]

/**
 * The whole hand profile of a child as far as it is locked. Inside a transaction everything is read through it: asking
 * for a second connection while holding one would stop the server once enough people do so.
 */
export const readHandFindings = async (access: ChildAccess, tx?: Tx): Promise<HandFindings> => {
  const { birthDate } = await findChildFacts(access, tx)
  const { responses, measures } = await listLockedHandEvidence(access, tx)
  const { lateralLine, statements } = handProfileOf(responses, measures, birthDate)
  const today = clinicToday(await readSettings(tx))
  return {
    ageYears: ageInYears(birthDate, today),
    lateralLine: lateralLine.map(withoutDetails),
    statements: statements.map(statementText),
    citations: each(lateralLine.map(({ opens }) => opens.citation)),
    cautions: each([...reportCautions, ...lateralLine.flatMap(({ opens }) => opens.cautions)]),
  }
}

/** What does not agree, as the therapist is shown it before the signature. */
export const contradictionsOf = (
  { lateralLine, ageYears }: Pick<HandFindings, 'lateralLine' | 'ageYears'>,
  { handPreference }: Pick<ConclusionContent, 'handPreference'>,
): string[] => handContradictions(lateralLine, handPreference, ageYears)

const isSame = (a: EvidenceLink, b: EvidenceLink) => a.kind === b.kind && a.id === b.id

/** What may be chosen: everything that no newer one replaced, and whatever this draft names already. */
export const evidenceChoices = (
  rows: readonly EvidenceRow[],
  chosen: readonly EvidenceLink[],
): EvidenceChoice[] =>
  rows.filter((row) => !row.superseded || chosen.some((link) => isSame(link, row))).map(evidenceChoice)

/** The chosen evidence in words; null when a piece is not a closed one of this child. */
export const chosenEvidence = (
  rows: readonly EvidenceRow[],
  chosen: readonly EvidenceLink[],
): EvidenceChoice[] | null => {
  const found = chosen.map((link) => rows.find((row) => isSame(link, row)))
  return found.every((row) => row !== undefined) ? found.map(evidenceChoice) : null
}
