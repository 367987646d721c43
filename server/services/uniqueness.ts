import { invalid } from '../errors.ts'

/** Runs a write whose unique key may be taken already; then the fields say so, whoever was first. */
export const unlessTaken = async <T>(work: Promise<T>, fields: Record<string, string>): Promise<T> => {
  try {
    return await work
  } catch (error) {
    if ((error as { code?: string }).code === 'ER_DUP_ENTRY') throw invalid(fields)
    throw error
  }
}
