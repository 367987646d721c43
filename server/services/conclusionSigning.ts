import { IsNull } from 'typeorm'
import { conclusionFindings, missingForSigning, signingProblems } from '../../shared/conclusionChecks.ts'
import {
  type ConclusionCheck,
  type ConclusionContent,
  type SignedEvidence,
  type Unfinished,
} from '../../shared/conclusions.ts'
import { addWorkingDays, formatAge } from '../../shared/days.ts'
import { conclusionTask } from '../../shared/tasks.ts'
import type { ClinicSettings } from '../../shared/settings.ts'
import type { Actor } from '../access/actor.ts'
import type { ChildAccess } from '../access/childAccess.ts'
import { now } from '../clock.ts'
import type { Tx } from '../dataSource.ts'
import { Conclusion } from '../entities/Conclusion.ts'
import { Task } from '../entities/Task.ts'
import { AppError, conflict, forbidden, invalid } from '../errors.ts'
import { textsOfReport, type ReportForPrint } from '../pdf/assessmentReport.ts'
import { unprintableIn } from '../pdf/letterFonts.ts'
import { canChangeConclusion, mayCountersignConclusion } from '../policies/conclusions.ts'
import { listBookingHolds } from '../queries/alerts.ts'
import { listEvidence, listUnfinished } from '../queries/conclusionEvidence.ts'
import { findReportChild, type ConclusionRecord } from '../queries/conclusions.ts'
import { lockChild } from '../queries/lockChild.ts'
import { findForChild } from '../queries/scope.ts'
import { contradictionsOf, evidenceChoices, readHandFindings } from './conclusionEvidence.ts'
import { conclusionFact, openConclusion, requireEvidence } from './conclusions.ts'
import { closeAssessment } from './episodes.ts'
import { clinicToday, readSettings } from './settings.ts'
import { addTask } from './tasks.ts'
import { transact } from './transact.ts'
import { StaleWrite, updateIfCurrent } from './versions.ts'

/** Working days in which a colleague countersigns (clinic rule). */
const daysToCountersign = 5

/** What stands between the stored draft and its signature, and what it may rest on. */
export const checkConclusion = async (
  access: ChildAccess,
  { content }: Pick<ConclusionRecord, 'content'>,
): Promise<ConclusionCheck> => {
  const [rows, findings, unfinished, signs] = await Promise.all([
    listEvidence(access),
    readHandFindings(access),
    listUnfinished(access),
    listBookingHolds(access),
  ])
  const contradictions = contradictionsOf(findings, content)
  return {
    evidenceChoices: evidenceChoices(rows, content.evidence),
    contradictions,
    missing: missingForSigning(content, contradictions),
    findings: conclusionFindings(content),
    unfinished,
    warningSigns: signs.map(({ text }) => text),
  }
}

const unfinishedProblem = (unfinished: readonly Unfinished[]): Record<string, string> =>
  unfinished.length === 0
    ? {}
    : {
        unfinished: `Sign or discard first what was begun: ${unfinished.map(({ words }) => words).join('; ')}`,
      }

/** Signs that hold a routine block back come before a signature too: whoever reads it takes the child to be looked after. */
const warningSignProblem = async (tx: Tx, access: ChildAccess): Promise<Record<string, string>> => {
  const signs = await listBookingHolds(access, tx)
  return signs.length === 0
    ? {}
    : {
        warningSigns:
          `Something comes first: ${signs.map(({ text }) => text).join(' · ')} ` +
          'Write down what was done about it under “Warning signs”, then sign.',
      }
}

/** Everything the report is drawn from, as it stands now. */
const snapshot = async (
  tx: Tx,
  access: ChildAccess,
  content: ConclusionContent,
  settings: ClinicSettings,
): Promise<SignedEvidence> => {
  const child = await findReportChild(access, tx)
  const findings = await readHandFindings(access, tx)
  const { clinicName, clinicAddress, clinicPhone, timeZone } = settings
  const calledOtherwise = child.preferredName !== null && child.preferredName !== child.givenName
  return {
    age: formatAge(child.birthDate, clinicToday(settings)),
    lateralLine: findings.lateralLine,
    evidence: await requireEvidence(tx, access, content),
    contradictions: contradictionsOf(findings, content),
    statements: findings.statements,
    citations: findings.citations,
    cautions: findings.cautions,
    head: {
      childName: `${child.givenName} ${calledOtherwise ? `(${child.preferredName}) ` : ''}${child.familyName}`,
      recordNumber: child.recordNumber,
      birthDate: child.birthDate,
      author: access.viewer.displayName,
      clinic: { clinicName, clinicAddress, clinicPhone, timeZone },
    },
  }
}

/** The report must be printable before it is signed, for afterwards nothing can be reworded. */
const requirePrintable = (report: ReportForPrint): void => {
  const odd = unprintableIn(textsOfReport(report))
  if (odd.length > 0)
    throw new AppError(
      422,
      'unprintable',
      `The report of this conclusion cannot be printed with these characters: ${odd.join(' ')}`,
    )
}

/**
 * Signs a draft in one transaction. The evidence is kept as it stands at that moment, so that the report stays the same;
 * the conclusion is then closed. One by a newly qualified person waits for a countersignature; any other ends the
 * assessment. 422 while something is missing, unfinished, blocked or unanswered, or a pressing warning sign
 * waits for somebody; throws StaleWrite.
 */
export const signConclusion = async (
  actor: Actor,
  access: ChildAccess,
  id: string,
  version: number,
): Promise<void> => {
  const settings = await readSettings()
  await transact(actor, async (tx, record) => {
    await lockChild(access, tx)
    const draft = await openConclusion(tx, access, id)
    if (draft.version !== version) throw new StaleWrite()
    if (!canChangeConclusion(access, draft)) throw forbidden('The therapist of the child signs.')
    const { content } = draft
    const evidence = await snapshot(tx, access, content, settings)
    const problems = {
      ...signingProblems(content, evidence.contradictions),
      ...unfinishedProblem(await listUnfinished(access, tx)),
      ...(await warningSignProblem(tx, access)),
    }
    if (Object.keys(problems).length > 0) throw invalid(problems)
    const signedAt = now()
    requirePrintable({ content, evidence, signedAt: signedAt.toISOString(), countersigned: null })

    const state = access.viewer.newlyQualified ? 'awaiting_countersignature' : 'signed'
    const patch = { state, evidence, authorId: access.viewer.id, signedAt } as const
    await updateIfCurrent(tx, Conclusion, id, version, patch)
    record({ ...conclusionFact(access, 'signed', id), detail: { state } })
    if (state === 'signed') await closeAssessment(tx, record, access, settings)
    else
      await addTask(tx, {
        childId: access.childId,
        kind: conclusionTask,
        text: 'Read and countersign the conclusion of the assessment',
        dueOn: addWorkingDays(clinicToday(settings), daysToCountersign),
        assigneeId: null,
        otherwise: 'clinicLead',
      })
  })
}

/** The task to countersign is done once none of the child's conclusions waits any more. */
const closeTask = async (tx: Tx, { childId, viewer }: ChildAccess): Promise<void> => {
  if (await tx.existsBy(Conclusion, { childId, state: 'awaiting_countersignature' })) return
  await tx.update(
    Task,
    { childId, kind: conclusionTask, doneAt: IsNull() },
    { doneAt: now(), doneById: viewer.id },
  )
}

/**
 * The second signature under a newly qualified person's conclusion. It ends the assessment. 422 while a pressing warning
 * sign waits for somebody; throws StaleWrite.
 */
export const countersignConclusion = async (
  actor: Actor,
  access: ChildAccess,
  id: string,
  version: number,
): Promise<void> => {
  const settings = await readSettings()
  await transact(actor, async (tx, record) => {
    await lockChild(access, tx)
    const conclusion = await findForChild(access, Conclusion, id, tx, { lock: true })
    if (conclusion.state !== 'awaiting_countersignature')
      throw conflict('closed', 'This conclusion is not waiting for a countersignature.')
    if (!mayCountersignConclusion(access, conclusion))
      throw forbidden('A second, experienced person countersigns: never the author.')
    if (conclusion.version !== version) throw new StaleWrite()
    const problems = await warningSignProblem(tx, access)
    if (Object.keys(problems).length > 0) throw invalid(problems)
    const { content, evidence, signedAt } = conclusion
    if (evidence === null || signedAt === null)
      throw new Error('A conclusion waits for its countersignature without what was signed')
    const countersignedAt = now()
    const countersigned = { by: access.viewer.displayName, at: countersignedAt.toISOString() }
    requirePrintable({ content, evidence, signedAt: signedAt.toISOString(), countersigned })
    await updateIfCurrent(tx, Conclusion, id, version, {
      state: 'signed',
      countersignedAt,
      countersignedById: access.viewer.id,
    })
    await closeTask(tx, access)
    record(conclusionFact(access, 'countersigned', id))
    await closeAssessment(tx, record, access, settings)
  })
}
