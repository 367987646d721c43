import type { TestProject } from 'vitest/node'
import type { SessionView } from '../../../shared/users.ts'
import { startClinic, type ClinicAddress } from './clinic.ts'

declare module 'vitest' {
  interface ProvidedContext {
    clinic: ClinicAddress
  }
}

/**
 * One clinic with the seeded demo for all browser tests of a run. `CLINIC_URL` names one that already runs, which
 * spares the seeding while a test is being written.
 */
export default async function clinicSetup(project: TestProject) {
  const url = process.env.CLINIC_URL
  if (url) {
    const session = (await (await fetch(`${url}/api/session`)).json()) as SessionView
    project.provide('clinic', { url, inboxUrl: session.clinic.inboxUrl ?? '', pid: null })
    return undefined
  }
  const { stop, ...address } = await startClinic()
  project.provide('clinic', address)
  return stop
}
