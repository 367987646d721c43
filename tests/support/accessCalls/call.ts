import type { ConsentPurpose } from '../../../shared/consents.ts'
import { database } from '../../../server/dataSource.ts'
import type { User } from '../../../server/entities/User.ts'
import type { Standing } from '../../server/accessFixture.ts'
import type { Person, Scene, SceneChild } from '../accessScene.ts'
import { giveConsent } from '../factories.ts'

/** Who is about to call, and about which child. */
export interface On {
  scene: Scene
  child: SceneChild
  person: Person
  standing: Standing
}

/** A valid call: what stands in the address after the child, what is sent, and how the scene is put back. */
export interface Call {
  ids?: string[]
  query?: string
  body?: object
  /** Sent as If-Match. */
  version?: number
  /** Sent as multipart, with `body` as the field `details`. */
  file?: Buffer
  /** Somebody who is used up by the call goes in the person's place. */
  instead?: Pick<Person, 'user' | 'cookie'> | undefined
  after?: () => Promise<unknown>
}

/** Writes what the call needs, freshly for each caller, and describes the call. */
export type Prepare = (on: On) => Call | Promise<Call>
export type Calls = Readonly<Record<string, Prepare>>

/** Whose note or letter is acted on: the caller's own where they treat the child, else the therapist's. */
export const authorOf = ({ standing, person, child }: On): User =>
  standing === 'T1' ? person.user : child.therapist

export const versionOf = async (
  table: 'children' | 'guardians' | 'episodes' | 'clinic_settings' | 'school_classes',
  id: string | number,
): Promise<number> => {
  const [row] = (await database().query(`SELECT version FROM ${table} WHERE id = ?`, [id])) as {
    version: number
  }[]
  return row?.version ?? 0
}

/** A yes can be given again only where none is in force. */
export const takeBackConsents = async ({ child, therapist }: SceneChild, purpose: ConsentPurpose) => {
  const given = (await database().query(
    `SELECT id FROM consents c WHERE childId = ? AND purpose = ? AND kind = 'given'
       AND NOT EXISTS (SELECT 1 FROM consents w WHERE w.withdrawsId = c.id)`,
    [child.id, purpose],
  )) as { id: string }[]
  for (const { id } of given)
    await giveConsent(child, purpose, therapist, { kind: 'withdrawn', withdrawsId: id })
}
