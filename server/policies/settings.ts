import type { Viewer } from '../access/actor.ts'
import { rolePolicy } from './policy.ts'

export const settingsPolicies = {
  read: rolePolicy('settings.read', ['clinicLead', 'administrator'], 'none'),
  change: rolePolicy('settings.change', ['clinicLead'], 'write'),
}

export const canChangeSettings = (viewer: Viewer) => viewer.roles.includes('clinicLead')
