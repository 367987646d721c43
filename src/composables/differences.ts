/** A text for each value as two people may compare it; lists are joined, absence is said in words. */
function worded(value: unknown): string {
  if (value === null || value === undefined || value === '') return 'empty'
  if (typeof value === 'boolean') return value ? 'yes' : 'no'
  if (Array.isArray(value)) return value.length === 0 ? 'empty' : value.map(worded).join('\n')
  if (typeof value === 'object') return Object.values(value).map(worded).join(', ')
  return String(value)
}

/** The labelled fields in which two versions differ, in words: for the panel shown after a stale save. */
export function differences<T extends object>(
  mine: Partial<Record<keyof T, unknown>>,
  theirs: T,
  labels: Partial<Record<keyof T, string>>,
): { label: string; mine: string; theirs: string }[] {
  const names = Object.keys(labels) as (keyof T)[]
  return names.flatMap((name) => {
    const part = {
      label: labels[name] ?? String(name),
      mine: worded(mine[name]),
      theirs: worded(theirs[name]),
    }
    return part.mine === part.theirs ? [] : [part]
  })
}
