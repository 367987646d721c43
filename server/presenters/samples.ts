import { consentNeededTexts } from '../../shared/consentNeeded.ts'
import { formatAge, formatDay } from '../../shared/days.ts'
import {
  lettersPerMinute,
  percentLegible,
  sampleScriptLabels,
  sampleTaskLabels,
} from '../../shared/handwriting.ts'
import type { SampleView, SampleWallView } from '../../shared/samples.ts'
import type { ChildAccess } from '../access/childAccess.ts'
import { canAddSample, canRemoveSample } from '../policies/samples.ts'
import type { SampleRecord } from '../queries/samples.ts'

const measuresOf = ({ details: { letters, legibleLetters, seconds } }: SampleRecord) => ({
  lettersPerMinute: lettersPerMinute({ letters, seconds }),
  percentLegible: percentLegible({ legible: legibleLetters, attempted: letters }),
})

/** What the picture shows, in words, for those who do not see it. */
const altText = (sample: SampleRecord): string => {
  const { task, script } = sample.details
  const measures = measuresOf(sample)
  const parts = [
    sampleTaskLabels[task].toLowerCase(),
    sampleScriptLabels[script].toLowerCase(),
    measures.lettersPerMinute === null ? null : `${Math.round(measures.lettersPerMinute)} letters a minute`,
    measures.percentLegible === null ? null : `${Math.round(measures.percentLegible)}% readable`,
  ].filter((part) => part !== null)
  const kind = sample.contentType === 'application/pdf' ? 'Scanned handwriting (PDF)' : 'Handwriting'
  return `${kind} of ${formatDay(sample.takenOn)} at ${formatAge(sample.birthDate, sample.takenOn)}: ${parts.join(', ')}`
}

export const presentSample = (sample: SampleRecord, access: ChildAccess): SampleView => ({
  id: sample.id,
  childId: sample.childId,
  takenOn: sample.takenOn,
  ageThen: formatAge(sample.birthDate, sample.takenOn),
  task: sample.details.task,
  script: sample.details.script,
  seconds: sample.details.seconds,
  letters: sample.details.letters,
  legibleLetters: sample.details.legibleLetters,
  reversals: sample.details.reversals,
  smudge: sample.details.smudge,
  lineAdherence: sample.details.lineAdherence,
  note: sample.details.note,
  ...measuresOf(sample),
  contentType: sample.contentType,
  bytes: sample.bytes,
  width: sample.width,
  height: sample.height,
  pixelsPerMm: sample.pixelsPerMm === null ? null : Number(sample.pixelsPerMm),
  uploadedBy: sample.uploadedBy,
  uploadedAt: sample.uploadedAt.toISOString(),
  alt: altText(sample),
  can: { remove: canRemoveSample(access) },
})

export const presentSampleWall = (
  samples: readonly SampleRecord[],
  access: ChildAccess,
  consented: boolean,
): SampleWallView => ({
  samples: samples.map((sample) => presentSample(sample, access)),
  blocked: consented ? null : consentNeededTexts.store_work_samples,
  can: { add: canAddSample(access, consented) },
})
