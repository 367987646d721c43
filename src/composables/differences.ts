/** The word people know a stored value by, e.g. 'Family doctor' for `family_doctor`; undefined when it is one already. */
export type Say<T> = (name: keyof T, value: unknown) => string | undefined

/** A text for each value as two people may compare it; lists are joined, absence is said in words. */
function worded(value: unknown, say: (value: unknown) => string | undefined): string {
  if (value === null || value === undefined || value === '') return 'empty'
  if (typeof value === 'boolean') return value ? 'yes' : 'no'
  if (Array.isArray(value))
    return value.length === 0 ? 'empty' : value.map((entry) => worded(entry, say)).join('\n')
  if (typeof value === 'object')
    return Object.values(value)
      .map((part) => worded(part, say))
      .join(', ')
  return say(value) ?? String(value)
}

const same = (one: unknown, other: unknown) => JSON.stringify(one) === JSON.stringify(other)
const keysOf = <T extends object>(value: T) => Object.keys(value) as (keyof T)[]

/**
 * Brings together what two people made of the same values. A field that only one of them changed is that person's;
 * `clashes` names the fields both changed, and differently, where only a person can choose. There `merged` keeps mine.
 */
export function mergeChanges<T extends object>(
  opened: T,
  mine: T,
  theirs: T,
): { merged: T; clashes: (keyof T)[] } {
  const merged = { ...mine }
  const clashes: (keyof T)[] = []
  for (const name of keysOf(mine)) {
    if (same(mine[name], theirs[name])) continue
    if (same(mine[name], opened[name])) merged[name] = theirs[name]
    else if (!same(theirs[name], opened[name])) clashes.push(name)
  }
  return { merged, clashes }
}

/** The fields named, in words for the panel that shows both versions. */
export const inWords = <T extends object>(
  names: readonly (keyof T)[],
  mine: T,
  theirs: T,
  labels: Partial<Record<keyof T, string>>,
  say: Say<T> = () => undefined,
): { label: string; mine: string; theirs: string }[] =>
  names.map((name) => ({
    label: labels[name] ?? String(name),
    mine: worded(mine[name], (value) => say(name, value)),
    theirs: worded(theirs[name], (value) => say(name, value)),
  }))
