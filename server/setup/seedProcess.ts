import { fork } from 'node:child_process'
import { fileURLToPath } from 'node:url'
import { SetUpError } from './setUpError.ts'
import type { SeedOrder } from '../seeds/main.ts'

/** In the bundle the seed lies beside this code; during development both are sources. */
const isBundle = import.meta.url.endsWith('.js')
const entry = fileURLToPath(new URL(isBundle ? './seed.js' : '../seeds/main.ts', import.meta.url))

/** Runs the seed of the demo clinic to its end in a process of its own. */
export const runSeed = (order: SeedOrder): Promise<void> =>
  new Promise((resolve, reject) => {
    const child = fork(entry, { execArgv: isBundle ? ['--enable-source-maps'] : ['--import', 'tsx'] })
    let done = false
    child.once('message', () => (done = true))
    child.once('error', reject)
    child.once('exit', () =>
      done
        ? resolve()
        : reject(
            new SetUpError(
              'The demo clinic could not be made; see above. Start again after npm run db:reset.',
            ),
          ),
    )
    child.send(order)
  })
