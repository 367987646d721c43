// Usage: closingLine.mjs RESULTS.json VITEST_EXIT_CODE [FAILED_STEP…]
// Prints "N passed, N failed[, N skipped]" as the last line and exits with 1 when anything failed. A failed step (lint,
// types …) and a test file that could not even be loaded count as one failure each, so 0 failed always means success.
import { readFileSync } from 'node:fs'

const [file, vitestCode, ...failedSteps] = process.argv.slice(2)

function readResults() {
  try {
    return JSON.parse(readFileSync(file, 'utf8'))
  } catch {
    return null
  }
}

const results = readResults()
const unloaded = (results?.testResults ?? []).filter(
  ({ status, assertionResults }) =>
    status === 'failed' && !assertionResults.some((assertion) => assertion.status === 'failed'),
).length
const counted = (results?.numFailedTests ?? 0) + unloaded
// Vitest also fails on errors outside any test, or may not have run at all.
const failedTests = counted === 0 && vitestCode !== '0' ? 1 : counted
const failed = failedTests + failedSteps.length
const passed = results?.numPassedTests ?? 0
const skipped = (results?.numPendingTests ?? 0) + (results?.numTodoTests ?? 0)

if (failedSteps.length > 0) console.log(`Failed before the tests, see above: ${failedSteps.join(', ')}`)
if (results === null) console.log('Vitest left no results.')
console.log(`${passed} passed, ${failed} failed${skipped > 0 ? `, ${skipped} skipped` : ''}`)
process.exit(failed > 0 ? 1 : 0)
