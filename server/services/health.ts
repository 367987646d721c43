import { database } from '../dataSource.ts'

/** Whether the database answers within two seconds. */
export const isDatabaseUp = async (): Promise<boolean> => {
  let timer: NodeJS.Timeout | undefined
  const late = new Promise<false>((resolve) => {
    timer = setTimeout(() => resolve(false), 2000)
  })
  try {
    return await Promise.race([
      database()
        .query('SELECT 1')
        .then(() => true),
      late,
    ])
  } catch {
    return false
  } finally {
    clearTimeout(timer)
  }
}

/** Whether anybody has an account yet. */
export const hasAccounts = async (): Promise<boolean> => {
  const [row] = (await database().query('SELECT id FROM users LIMIT 1')) as { id: string }[]
  return row !== undefined
}
