const systemTime = () => new Date()
let source = systemTime

/** The one clock of the server: ages, waits, due dates, links and retention all read it. */
export const now = (): Date => source()

/** Tests put their own clock in place. */
export const setClock = (next: () => Date): void => {
  source = next
}

/** Back to the time of this machine, after the demo was dated. */
export const resetClock = (): void => {
  source = systemTime
}
