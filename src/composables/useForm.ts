import { useForm as useValidatedForm, type TypedSchema } from 'vee-validate'
import { computed, onScopeDispose, reactive, readonly, ref, shallowRef, toRaw, watch, type Ref } from 'vue'
import { ValidationError, type AnyObject, type InferType, type Schema } from 'yup'
import type { Problem } from '@shared/problems.ts'
import { HttpProblem } from '@/api/http.ts'
import { wasStopped, wordsFor } from '@/composables/problems.ts'
import { useLeaveGuard } from '@/composables/useLeaveGuard.ts'
import { markTabFailed } from '@/composables/usePageTitle.ts'

interface FormOptions<Values extends AnyObject, S extends Schema, Answer> {
  /** The schema of shared/ that the server uses too. */
  schema: S
  /** Values the form opens with; asked again by `reset()`. */
  initial: () => Values
  /** Gets the tidied values. Throws HttpProblem when refused. */
  save: (sent: InferType<S>) => Promise<Answer>
  /** After a save; the form no longer counts as changed. */
  saved?: (answer: Answer) => unknown
  /** Where the server names a field otherwise than the form: server's path → form's path. */
  serverFields?: Record<string, string>
  /** No warning before leaving, e.g. for signing in. */
  unguarded?: boolean
}

/** The shared schema as vee-validate takes it, so that what is sent has the same tidied text the server would make. */
const checkedBy = (schema: Schema): TypedSchema => ({
  __type: 'VVTypedSchema',
  async parse(values: AnyObject) {
    try {
      return { value: (await schema.validate(values, { abortEarly: false })) as AnyObject, errors: [] }
    } catch (error) {
      if (!(error instanceof ValidationError)) throw error
      const found = error.inner.length > 0 ? error.inner : [error]
      return { errors: found.map(({ path, errors }) => ({ path: path ?? '', errors })) }
    }
  },
})

/**
 * One form: checks with the shared schema, sends once, puts the server's words beside the fields, and keeps everything
 * that was typed whatever happens. Messages appear on submit and only go away while the person mends them.
 *
 * `conflict` holds what is stored now when the server answered 409 `stale`; `problem` any other refusal.
 */
export function useForm<Values extends AnyObject, S extends Schema, Answer = void>(
  options: FormOptions<Values, S, Answer>,
) {
  const form = useValidatedForm<AnyObject>({
    validationSchema: checkedBy(options.schema),
    initialValues: options.initial(),
  })
  // vee-validate hands its values out read-only; this is its own reactive object, for v-model to write to.
  const values = reactive(toRaw(form.values)) as Values
  const fieldErrors: Ref<Record<string, string>> = ref({})
  const busy = ref<boolean>(false)
  const problem = shallowRef<Problem | null>(null)
  const conflict = shallowRef<unknown>(null)
  const finished = ref<boolean>(false)
  const dirty = computed(() => form.meta.value.dirty && !finished.value)

  const refuse = (errors: Record<string, string>) => {
    fieldErrors.value = errors
    markTabFailed(true)
  }

  const localPath = (path: string) => options.serverFields?.[path] ?? path

  function take(error: unknown): void {
    if (wasStopped(error)) return
    if (!(error instanceof HttpProblem)) {
      problem.value = { code: 'unexpected', message: wordsFor(error), requestId: '' }
      markTabFailed(true)
      throw error
    }
    const { fields, code, current } = error.problem
    if (fields && Object.keys(fields).length > 0) {
      refuse(Object.fromEntries(Object.entries(fields).map(([path, message]) => [localPath(path), message])))
      return
    }
    if (error.status === 409 && code === 'stale') conflict.value = current ?? null
    problem.value = error.problem
    markTabFailed(true)
  }

  const check = form.handleSubmit(
    async (sent) => {
      try {
        const answer = await options.save(sent as InferType<S>)
        finished.value = true
        await options.saved?.(answer)
      } catch (error) {
        take(error)
      }
    },
    ({ errors }) =>
      refuse(Object.fromEntries(Object.entries(errors).map(([path, message]) => [path, String(message)]))),
  )

  /** Checks and sends. A second call while one is under way does nothing. */
  async function submit(): Promise<void> {
    if (busy.value) return
    busy.value = true
    fieldErrors.value = {}
    problem.value = null
    conflict.value = null
    markTabFailed(false)
    try {
      await check()
    } finally {
      busy.value = false
    }
  }

  /** Back to the given values (or the initial ones), with no message and nothing unsaved. */
  function reset(next: Values = options.initial()): void {
    finished.value = false
    fieldErrors.value = {}
    problem.value = null
    conflict.value = null
    markTabFailed(false)
    form.resetForm({ values: next as AnyObject }, { force: true })
  }

  // A message goes as soon as its field is right; none appears while somebody is still typing.
  watch(
    values as object,
    async () => {
      finished.value = false
      const shown = Object.keys(fieldErrors.value)
      if (shown.length === 0) return
      const { errors } = await form.validate({ mode: 'silent' })
      const left: Record<string, string> = {}
      for (const path of shown) {
        const message = errors[path]
        if (message) left[path] = message
      }
      fieldErrors.value = left
      if (Object.keys(left).length === 0) markTabFailed(false)
    },
    { deep: true },
  )

  if (!options.unguarded) useLeaveGuard(() => dirty.value)
  onScopeDispose(() => markTabFailed(false))

  return {
    values,
    fieldErrors: readonly(fieldErrors) as Readonly<Ref<Record<string, string>>>,
    busy: readonly(busy),
    problem: problem as Readonly<Ref<Problem | null>>,
    conflict: conflict as Readonly<Ref<unknown>>,
    dirty,
    submit,
    reset,
  }
}
