import { listEvidence } from '../queries/conclusionEvidence.ts'
import { findConclusion } from '../queries/conclusions.ts'
import { saveConclusion, startConclusion } from '../services/conclusions.ts'
import { countersignConclusion, signConclusion } from '../services/conclusionSigning.ts'
import type { DemoConclusion } from './demo/assessmentTypes.ts'
import type { StaffKey } from './demo/people.ts'
import { acting, idIn, storyOf, type Scene } from './playScene.ts'

/** More than this nobody rests a conclusion on; the newest come first. */
const mostEvidence = 40

export const playConclusion = async (
  scene: Scene,
  number: number,
  { by, restsOn, content, signed, replacesEarlier }: DemoConclusion,
  index: number,
): Promise<void> => {
  const { conclusionIds } = storyOf(scene, number)
  const { actor, access } = await acting(scene, number, by)
  const replacesId = replacesEarlier ? idIn(conclusionIds, index - 1) : null
  const id = await startConclusion(actor, access, { replacesId }, null)
  conclusionIds.set(index, id)
  const evidence = (await listEvidence(access))
    .filter(({ kind, superseded }) => restsOn.includes(kind) && !superseded)
    .slice(0, mostEvidence)
    .map(({ kind, id: evidenceId }) => ({ kind, id: evidenceId }))
  const { version } = await findConclusion(access, id)
  const saved = await saveConclusion(actor, access, id, version, { ...content, evidence })
  if (signed) await signConclusion(actor, access, id, saved.version)
}

export const playSecondSignature = async (
  scene: Scene,
  number: number,
  index: number,
  by: StaffKey,
): Promise<void> => {
  const { actor, access } = await acting(scene, number, by)
  const id = idIn(storyOf(scene, number).conclusionIds, index)
  const { version } = await findConclusion(access, id)
  await countersignConclusion(actor, access, id, version)
}
