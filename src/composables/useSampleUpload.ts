import { onScopeDispose, readonly, ref, toValue, type MaybeRefOrGetter } from 'vue'
import type { SampleDetails, SampleView } from '@shared/samples.ts'
import { newIdempotencyKey } from '@/api/http.ts'
import { samplesApi } from '@/api/samples.ts'
import { wasStopped } from '@/composables/problems.ts'

export type UploadState = 'idle' | 'sending' | 'checking' | 'done' | 'failed'

/** Sends one sample and tells how far it is. The same file sent again after a lost answer is kept once only. */
export function useSampleUpload(childId: MaybeRefOrGetter<string>) {
  const share = ref<number>(0)
  const state = ref<UploadState>('idle')
  let key = newIdempotencyKey()
  let stop = new AbortController()
  onScopeDispose(() => stop.abort())

  async function upload(file: File, details: SampleDetails): Promise<SampleView> {
    stop = new AbortController()
    share.value = 0
    state.value = 'sending'
    try {
      const sample = await samplesApi.add(toValue(childId), {
        file,
        details,
        idempotencyKey: key,
        signal: stop.signal,
        onProgress: (sent) => {
          share.value = sent
          if (sent >= 1) state.value = 'checking'
        },
      })
      state.value = 'done'
      key = newIdempotencyKey()
      return sample
    } catch (error) {
      state.value = wasStopped(error) ? 'idle' : 'failed'
      throw error
    }
  }

  return {
    share: readonly(share),
    state: readonly(state),
    upload,
    cancel: () => stop.abort(),
  }
}
