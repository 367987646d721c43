import { childPolicy, rolePolicy } from './policy.ts'

/** A teacher's side. Whoever is not the child's present teacher under a consent gets the answer for an absent child. */
export const classPolicies = {
  list: rolePolicy('classes.list', ['teacher'], 'read'),
  pupils: rolePolicy('classes.pupils', ['teacher'], 'read'),
  pupil: childPolicy('pupil.read', ['teacher'], 'read'),
  reply: childPolicy('pupil.reply', ['teacher'], 'write'),
}
