/** Tables whose rows the running server may change. Every other row is written once and stays as it is. */
export const updatableTables: readonly string[] = []

/** Tables whose rows the running server may delete. */
export const deletableTables: readonly string[] = []
