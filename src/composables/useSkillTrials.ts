import { computed, ref } from 'vue'
import { useConfirmStep } from '@/composables/useConfirmStep.ts'
import { useLeaveGuard } from '@/composables/useLeaveGuard.ts'
import { nextTrial, unlikelyTrial } from '@shared/handSkill.ts'
import type { SkillDetails, SkillTrial } from '@shared/measures.ts'
import type { Hand } from '@shared/roles.ts'

const opposite: Record<Hand, Hand> = { left: 'right', right: 'left' }

interface SkillTrials {
  details: () => SkillDetails
  change: (details: SkillDetails) => void
  /** A value with its unit, e.g. '0.0 s'. */
  words: (value: number) => string
}

/**
 * The trials of one task: whose turn it is, keeping, taking back, marking as interrupted. An unlikely value is kept
 * only after the therapist has said so; refused, it waits in the field to be corrected, so nothing measured is lost.
 */
export function useSkillTrials({ details, change, words }: SkillTrials) {
  const confirm = useConfirmStep()
  /** The therapist lets the other hand go now; back to turns afterwards. */
  const swappedTurn = ref<boolean>(false)
  const typed = ref<number | null>(null)
  /** What became of the last trial, for the live region. */
  const said = ref<string>('')

  const turn = computed(() => nextTrial(details()))
  const hand = computed<Hand | null>(() => {
    if (turn.value === null) return null
    return swappedTurn.value ? opposite[turn.value.hand] : turn.value.hand
  })

  const add = (trial: SkillTrial) => {
    change({ ...details(), trials: [...details().trials, trial] })
    swappedTurn.value = false
    typed.value = null
    const name = trial.hand === 'left' ? 'Left' : 'Right'
    const value = trial.value === null ? 'no value' : words(trial.value)
    said.value = `${name} hand: ${value} kept${trial.interrupted ? ', marked as interrupted' : ''}.`
  }

  const mayKeep = (value: number, doubt: string) =>
    confirm({
      title: `Keep ${words(value)}?`,
      text: doubt,
      action: `Keep ${words(value)}`,
      keep: 'Do not keep it yet',
    })

  /** Answers whether the value was kept. */
  async function keep(value: number, interrupted = false): Promise<boolean> {
    const by = hand.value
    if (by === null) return false
    // An interrupted trial counts in no figure: an odd value is to be expected there.
    const doubt = interrupted ? null : unlikelyTrial(details().kind, value, details())
    if (doubt !== null) {
      typed.value = value
      if (!(await mayKeep(value, doubt))) {
        said.value = `${words(value)} waits in the field: correct it, or measure again.`
        return false
      }
    }
    add({ hand: by, value, interrupted, confirmed: doubt !== null })
    return true
  }

  const takeBack = () => {
    const last = details().trials.at(-1)
    if (!last) return
    change({ ...details(), trials: details().trials.slice(0, -1) })
    swappedTurn.value = false
    said.value = 'The last trial is taken back.'
  }
  /** A trial that was set aside counts again only after the same question as a new one. */
  const toggleInterrupted = async (index: number) => {
    const trial = details().trials[index]
    if (!trial) return
    const value = trial.value
    const doubt =
      trial.interrupted && !trial.confirmed ? unlikelyTrial(details().kind, value, details()) : null
    if (doubt !== null && value !== null && !(await mayKeep(value, doubt))) return
    const changed = {
      ...trial,
      interrupted: !trial.interrupted,
      confirmed: trial.confirmed || doubt !== null,
    }
    change({ ...details(), trials: details().trials.with(index, changed) })
  }
  const otherHand = () => {
    swappedTurn.value = !swappedTurn.value
  }

  // A value in the field is measured but not kept: leaving would lose it.
  useLeaveGuard(() => typed.value !== null)

  return { turn, hand, typed, said, keep, takeBack, toggleInterrupted, otherHand }
}
