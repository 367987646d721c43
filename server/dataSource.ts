import 'reflect-metadata'
import { DataSource, type EntityManager } from 'typeorm'
import { AdviceAnswer } from './entities/AdviceAnswer.ts'
import { Alert } from './entities/Alert.ts'
import { AnswerRequest } from './entities/AnswerRequest.ts'
import { Assignment } from './entities/Assignment.ts'
import { AuditEntry } from './entities/AuditEntry.ts'
import { AuditHead } from './entities/AuditHead.ts'
import { Child } from './entities/Child.ts'
import { ClassTeacher } from './entities/ClassTeacher.ts'
import { ClinicSetting } from './entities/ClinicSetting.ts'
import { Conclusion } from './entities/Conclusion.ts'
import { Consent } from './entities/Consent.ts'
import { Episode } from './entities/Episode.ts'
import { EpisodeChange } from './entities/EpisodeChange.ts'
import { Goal } from './entities/Goal.ts'
import { GoalRating } from './entities/GoalRating.ts'
import { Guardian } from './entities/Guardian.ts'
import { History } from './entities/History.ts'
import { IdempotencyKey } from './entities/IdempotencyKey.ts'
import { KnownDevice } from './entities/KnownDevice.ts'
import { Letter } from './entities/Letter.ts'
import { LetterDelivery } from './entities/LetterDelivery.ts'
import { LetterVersion } from './entities/LetterVersion.ts'
import { Measure } from './entities/Measure.ts'
import { NoteAddendum } from './entities/NoteAddendum.ts'
import { NoteRevision } from './entities/NoteRevision.ts'
import { NoteSignature } from './entities/NoteSignature.ts'
import { OutboxMessage } from './entities/OutboxMessage.ts'
import { QuestionnaireForm } from './entities/QuestionnaireForm.ts'
import { QuestionnaireResponse } from './entities/QuestionnaireResponse.ts'
import { RecordNumber } from './entities/RecordNumber.ts'
import { Referral } from './entities/Referral.ts'
import { Sample } from './entities/Sample.ts'
import { School } from './entities/School.ts'
import { SchoolAdvice } from './entities/SchoolAdvice.ts'
import { SchoolClass } from './entities/SchoolClass.ts'
import { SessionNote } from './entities/SessionNote.ts'
import { Task } from './entities/Task.ts'
import { Throttle } from './entities/Throttle.ts'
import { User } from './entities/User.ts'
import { UserSession } from './entities/UserSession.ts'
import { UserToken } from './entities/UserToken.ts'
import { WritingObservation } from './entities/WritingObservation.ts'
import { migrations } from './migrations/all.ts'
import { connectionOptions, type DatabaseAccess } from './setup/databaseAccess.ts'

/** Seconds after which MariaDB ends a statement of the app account (exports will ask for more). */
const statementSeconds = 5

export const entities = [
  AdviceAnswer, Alert, AnswerRequest, Assignment, AuditEntry, AuditHead, Child, ClassTeacher, ClinicSetting,
  Conclusion, Consent, Episode, EpisodeChange, Goal, GoalRating, Guardian, History, IdempotencyKey, KnownDevice,
  Letter, LetterDelivery, LetterVersion, Measure, NoteAddendum, NoteRevision, NoteSignature, OutboxMessage,
  QuestionnaireForm, QuestionnaireResponse, RecordNumber, Referral, Sample, School, SchoolAdvice, SchoolClass,
  SessionNote, Task, Throttle, User, UserSession, UserToken, WritingObservation,
] // prettier-ignore

/** Logging stays off: TypeORM would print query parameters, which are personal data. */
export const createDataSource = (access: DatabaseAccess): DataSource =>
  new DataSource({
    type: 'mariadb',
    ...typeormAddress(access),
    entities,
    migrations,
    migrationsTransactionMode: 'each',
    synchronize: false,
    logging: false,
    charset: 'utf8mb4_unicode_ci',
    timezone: 'Z',
    dateStrings: ['DATE'],
    supportBigNumbers: true,
    bigNumberStrings: true,
    poolSize: 10,
    connectTimeout: 5000,
    invalidWhereValuesBehavior: { null: 'throw', undefined: 'throw' },
  })

const typeormAddress = (access: DatabaseAccess) => {
  const { user, ...rest } = connectionOptions(access)
  return { ...rest, username: user }
}

interface PoolWithEvents {
  on(event: 'connection', listener: (connection: { query(sql: string): unknown }) => void): void
}

let current: DataSource | null = null

/** Opens the pool of the app account for this process. */
export const openDatabase = async (access: DatabaseAccess): Promise<DataSource> => {
  const dataSource = createDataSource(access)
  await dataSource.initialize()
  const { pool } = dataSource.driver as unknown as { pool: PoolWithEvents }
  const limit = `SET SESSION max_statement_time = ${statementSeconds}`
  pool.on('connection', (connection) => void connection.query(limit))
  // The connection that initialize() opened is already in the pool.
  await dataSource.query(limit)
  current = dataSource
  return dataSource
}

export const closeDatabase = async (): Promise<void> => {
  const closing = current
  current = null
  await closing?.destroy()
}

export const database = (): DataSource => {
  if (!current) throw new Error('The database has not been opened yet')
  return current
}

export type Tx = EntityManager
