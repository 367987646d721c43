import type { ChildAccess } from '../access/childAccess.ts'
import { childPolicy, isRelation } from './policy.ts'

const write = (name: string) => childPolicy(name, ['assignedTherapist'], 'write', ['clinicLead'])

export const questionnairePolicies = {
  read: childPolicy('questionnaire.read', ['assignedTherapist', 'clinicLead'], 'read'),
  start: write('questionnaire.start'),
  change: write('questionnaire.change'),
  discard: write('questionnaire.discard'),
  lock: write('questionnaire.lock'),
}

interface Response {
  lockedAt: Date | null
  /** Set while a carer or teacher answers for themselves. */
  requestId: string | null
  /** That request ended before the answers were sent. */
  leftOver: boolean
  replacedById: string | null
}

export const canAddQuestionnaire = (access: ChildAccess, consented: boolean) =>
  isRelation(access, 'assignedTherapist') && consented

export const canChangeQuestionnaire = (access: ChildAccess, { lockedAt, requestId }: Response) =>
  isRelation(access, 'assignedTherapist') && lockedAt === null && requestId === null

/** What nobody can finish any more may be cleared away; while somebody may still answer, it is theirs. */
export const canDiscardQuestionnaire = (access: ChildAccess, { lockedAt, requestId, leftOver }: Response) =>
  isRelation(access, 'assignedTherapist') && lockedAt === null && (requestId === null || leftOver)

export const canReplaceQuestionnaire = (access: ChildAccess, { lockedAt, replacedById }: Response) =>
  isRelation(access, 'assignedTherapist') && lockedAt !== null && replacedById === null
