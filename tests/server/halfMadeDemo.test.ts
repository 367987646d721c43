import { afterAll, beforeEach, describe, expect, it } from 'vitest'
import { systemActor } from '../../server/access/actor.ts'
import { closeDatabase } from '../../server/dataSource.ts'
import { recordAudit } from '../../server/services/audit.ts'
import { clearHalfMadeDemo, demoBegun, demoMade } from '../../server/setup/halfMadeDemo.ts'
import { openClinicDatabase } from '../support/clinicDatabase.ts'
import { createEmptyDatabase, testDatabaseAccess } from '../support/database.ts'

beforeEach(async () => {
  await openClinicDatabase()
})
afterAll(closeDatabase)

const mark = (action: string) => recordAudit(systemActor('test'), { action })

describe('a start of the demo', () => {
  it('begins anew when an earlier one was cut off while the clinic was being made', async () => {
    await mark(demoBegun)
    await closeDatabase()
    const owner = testDatabaseAccess().migrate
    expect(await clearHalfMadeDemo(owner)).toBe(true)
    expect(await clearHalfMadeDemo(owner)).toBe(false)
  })

  it('keeps a clinic that was made to the end, and one that is nobody’s demo', async () => {
    expect(await clearHalfMadeDemo(testDatabaseAccess().migrate)).toBe(false)
    await mark(demoBegun)
    await mark(demoMade)
    expect(await clearHalfMadeDemo(testDatabaseAccess().migrate)).toBe(false)
  })

  it('finds nothing to clear in an empty database', async () => {
    await closeDatabase()
    const { migrate } = await createEmptyDatabase()
    expect(await clearHalfMadeDemo(migrate)).toBe(false)
  })
})
