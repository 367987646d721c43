import type { ChildAccess } from '../access/childAccess.ts'
import type { HistoryInformant } from '../../shared/histories.ts'
import { childPolicy, isRelation } from './policy.ts'

const read = (name: string) => childPolicy(name, ['assignedTherapist', 'clinicLead'], 'read')
const write = (name: string) => childPolicy(name, ['assignedTherapist'], 'write', ['clinicLead'])

/** As questionnaire responses: the therapist's to write, the lead's to read; families answer on pages of their own. */
export const historyPolicies = {
  list: read('histories.list'),
  read: read('history.read'),
  start: write('history.start'),
  change: write('history.change'),
  discard: write('history.discard'),
  lock: write('history.lock'),
}

interface Stored {
  informant: HistoryInformant
  lockedAt: Date | null
  replacedById: string | null
  /** Begun for a request that ended before the answers were sent. */
  leftOver: boolean
}

/** What a family is still answering is theirs alone. */
export const canChangeHistory = (access: ChildAccess, { informant, lockedAt }: Stored) =>
  isRelation(access, 'assignedTherapist') && lockedAt === null && informant === 'therapist'

/** What a family can no longer send may be cleared away. */
export const canDiscardHistory = (access: ChildAccess, { informant, lockedAt, leftOver }: Stored) =>
  isRelation(access, 'assignedTherapist') && lockedAt === null && (informant === 'therapist' || leftOver)

export const canReplaceHistory = (access: ChildAccess, { lockedAt, replacedById }: Stored) =>
  isRelation(access, 'assignedTherapist') && lockedAt !== null && replacedById === null
