import type { Role } from '../../shared/roles.ts'

/*
 * Who may do what, route by route, written by hand from the clinic's access matrix. It is not derived from the code's
 * policies: where the two differ, the sweep (accessSweep.test.ts) fails.
 *
 * Emergency grants are not built yet, so the holder of one is left out. Teachers' and carers' own
 * samples and referrals, goal ratings and comments are not built either: until they are, the record's own routes know
 * neither teacher nor carer.
 */

/** How a person stands to one child, in the matrix's columns. */
export const standings = ['T1', 'T2', 'L', 'E1', 'E0', 'EX', 'G1', 'G0', 'GX', 'AD'] as const
/**
 * T1 therapist assigned now · T2 therapist not or no longer assigned · L clinic lead · E1 teacher of the present class,
 * sharing in force · E0 the same without, withdrawn or expired · EX teacher of another or a former class · G1 carer
 * verified, active, not restricted · G0 carer restricted, unverified, ended or child of age · GX carer of another child ·
 * AD administrator.
 */
export type Standing = (typeof standings)[number]

/** 404: may not know that it exists. 403: may see it, or knows the room, but may not do this. */
export type Expected = 'ok' | 401 | 403 | 404

export interface AccessRow {
  route: string
  /** Whose room this is; others get 403 whatever they ask for. Null: the relation to the child alone decides. */
  area: 'open' | 'signedIn' | readonly Role[] | null
  /**
   * What the addressed thing belongs to; null when nothing particular is addressed. A referral in the queue and what
   * belongs to the clinic are no child's: there a person stands by role alone (any therapist is T2).
   */
  bound: 'child' | 'class' | 'letter' | 'task' | 'referral' | 'queue' | 'clinic' | null
  ok: readonly Standing[]
  refused: readonly Standing[]
  /** Audit entries an allowed call must leave. What names no person and reads no record leaves none. */
  entries: 0 | 1 | 2
}

const clinical: readonly Role[] = ['therapist', 'clinicLead']
const staff: readonly Role[] = ['therapist', 'clinicLead', 'administrator']
const office: readonly Role[] = ['clinicLead', 'administrator']

const open = (route: string): AccessRow => ({
  route,
  area: 'open',
  bound: null,
  ok: [],
  refused: [],
  entries: 0,
})
const signedIn = (route: string): AccessRow => ({ ...open(route), area: 'signedIn', entries: 1 })
const area = (route: string, roles: readonly Role[], entries: 0 | 1 = 1): AccessRow => ({
  ...open(route),
  area: roles,
  entries,
})
/** Standings named in neither list get 404. */
const child = (route: string, ok: Standing[], refused: Standing[] = []): AccessRow => ({
  route: route.replace('…', '/api/children/:childId'),
  area: null,
  bound: 'child',
  ok,
  refused,
  entries: 1,
})
const within = (
  route: string,
  roles: readonly Role[],
  bound: AccessRow['bound'],
  ok: Standing[],
  refused: Standing[] = [],
): AccessRow => ({ route, area: roles, bound, ok, refused, entries: 1 })

export const accessRows: readonly AccessRow[] = [
  // The way in and the state of the server
  open('GET /api/health'),
  open('GET /api/session'),
  open('POST /api/sign-in'),
  open('POST /api/sign-out'),
  open('POST /api/password-resets'),
  open('POST /api/password-resets/confirm'),
  open('POST /api/invitations/confirm'),
  signedIn('PATCH /api/me'),
  signedIn('POST /api/me/password'),

  // Child list, search, counts: own caseload, the clinic, or identity only; teachers and carers have rooms of their own
  area('GET /api/today', staff),
  area('GET /api/children/find', staff),
  area('GET /api/caseload', clinical),
  area('GET /api/children', ['administrator']),
  area('GET /api/review', ['clinicLead']),
  area('GET /api/review/:figure', ['clinicLead']),
  area('GET /api/therapists', staff, 0),
  // The matrix has no row for tasks: they are read as part of the record, which therapist and lead may change.
  within('POST /api/tasks/:id/finish', staff, 'task', ['T1', 'L']),

  // Referrals. The matrix gives administrators "R, U admin fields"; the clinic's work has them enter what comes in.
  // A therapist may take a child from the queue, but closing one without a record is the lead's.
  area('GET /api/referrals', staff),
  area('POST /api/referrals', office),
  area('GET /api/referrals/duplicates', office),
  within('GET /api/referrals/:id', staff, 'referral', ['T1', 'L', 'AD']),
  within('PUT /api/referrals/:id', office, 'queue', ['L', 'AD']),
  // The record that begins and the decision on the referral are two entries.
  { ...within('POST /api/referrals/:id/accept', clinical, 'queue', ['L', 'T2']), entries: 2 },
  within('POST /api/referrals/:id/decline', ['clinicLead'], 'queue', ['L']),

  // Child record: staff see the record, administrators identity and contact. Teacher and carer know the child and have
  // rooms of their own for what they may see, so here they are refused.
  child('GET …', ['T1', 'L', 'AD'], ['E1', 'G1']),
  child('GET …/glance', ['T1', 'L'], ['E1', 'G1', 'AD']),
  child('GET …/identity', ['T1', 'L', 'AD'], ['E1', 'G1']),
  child('PUT …/identity', ['T1', 'L', 'AD'], ['E1', 'G1']),
  child('PATCH …/care', ['T1', 'L'], ['E1', 'G1', 'AD']),
  child('POST …/state', ['T1', 'L'], ['E1', 'G1', 'AD']),
  // Warning signs are part of the clinical record, which therapist and lead may change.
  child('GET …/alerts', ['T1', 'L'], ['E1', 'G1', 'AD']),
  child('POST …/alerts', ['T1', 'L'], ['E1', 'G1', 'AD']),
  child('POST …/alerts/:id/action', ['T1', 'L'], ['E1', 'G1', 'AD']),
  // Caseload assignment: staff who see the child read it, a carer sees the therapist's name, only the lead changes it
  child('POST …/allocation', ['L'], ['T1', 'AD', 'G1']),
  // Audit log by child; a carer gets role, date and kind of access
  child('GET …/access-history', ['T1', 'L', 'G1'], ['AD']),

  // Guardians: links and contacts. A carer reads and changes their own contact in their own room, which leaves out
  // whether the clinic holds them safe to contact.
  child('GET …/guardians', ['T1', 'L', 'AD'], ['G1']),
  child('POST …/guardians', ['T1', 'L', 'AD'], ['G1']),
  child('PUT …/guardians/:id', ['T1', 'L', 'AD'], ['G1']),
  child('POST …/guardians/:id/invite', ['T1', 'L', 'AD'], ['G1']),
  child('POST …/guardians/:id/restrict', ['T1', 'L', 'AD'], ['G1']),

  // Consents: rows never change, a withdrawal is a new row. A teacher may know yes or no, a carer has a room of their own.
  child('GET …/consents', ['T1', 'L', 'AD'], ['E1', 'G1']),
  child('POST …/consents', ['T1', 'L'], ['AD', 'E1', 'G1']),
  child('POST …/consents/:id/withdraw', ['T1', 'L'], ['AD', 'E1', 'G1']),

  // Questionnaire responses
  child('GET …/hand-profile', ['T1', 'L']),
  child('POST …/questionnaires', ['T1'], ['L']),
  child('GET …/questionnaires/:id', ['T1', 'L']),
  child('PUT …/questionnaires/:id', ['T1'], ['L']),
  // The matrix grants no deletion; throwing away one's own unlocked form is read as part of U.
  child('DELETE …/questionnaires/:id', ['T1'], ['L']),
  child('POST …/questionnaires/:id/lock', ['T1'], ['L']),

  // Histories: the family's questionnaire on the child, so as questionnaire responses. A carer's own form has its rooms.
  child('GET …/histories', ['T1', 'L']),
  child('POST …/histories', ['T1'], ['L']),
  child('GET …/histories/:id', ['T1', 'L']),
  child('PUT …/histories/:id', ['T1'], ['L']),
  child('DELETE …/histories/:id', ['T1'], ['L']),
  child('POST …/histories/:id/lock', ['T1'], ['L']),

  // Observations
  child('GET …/writing-observations', ['T1', 'L']),
  child('POST …/writing-observations', ['T1'], ['L']),

  // Measures are observations: taken and locked by the therapist, read by the lead. Discarding one that was begun and
  // never locked is read as part of U.
  child('GET …/measures', ['T1', 'L']),
  child('POST …/measures', ['T1'], ['L']),
  child('GET …/measures/:id', ['T1', 'L']),
  child('PUT …/measures/:id', ['T1'], ['L']),
  child('DELETE …/measures/:id', ['T1'], ['L']),
  child('POST …/measures/:id/lock', ['T1'], ['L']),

  // Conclusions rest on observations and follow their row: written and signed by the therapist, read by the lead; the
  // countersignature is the lead's or an experienced colleague's, as for notes.
  child('GET …/conclusions', ['T1', 'L']),
  child('POST …/conclusions', ['T1'], ['L']),
  child('GET …/conclusions/:id', ['T1', 'L']),
  child('PUT …/conclusions/:id', ['T1'], ['L']),
  child('DELETE …/conclusions/:id', ['T1'], ['L']),
  child('GET …/conclusions/:id/check', ['T1', 'L']),
  child('POST …/conclusions/:id/sign', ['T1'], ['L']),
  child('POST …/conclusions/:id/countersign', ['T1', 'L']),
  child('GET …/conclusions/:id/report.pdf', ['T1', 'L']),

  // Session notes: a draft is its author's; a signed one takes addenda and countersignatures of therapist and lead
  child('GET …/session-notes', ['T1', 'L']),
  child('POST …/session-notes', ['T1'], ['L']),
  child('GET …/session-notes/:id', ['T1', 'L']),
  child('PUT …/session-notes/:id', ['T1'], ['L']),
  child('DELETE …/session-notes/:id', ['T1'], ['L']),
  child('GET …/session-notes/:id/revisions', ['T1', 'L']),
  child('POST …/session-notes/:id/sign', ['T1'], ['L']),
  child('POST …/session-notes/:id/countersign', ['T1', 'L']),
  child('POST …/session-notes/:id/addenda', ['T1', 'L']),

  // Handwriting samples, file and thumbnail
  child('GET …/samples', ['T1', 'L']),
  child('POST …/samples', ['T1'], ['L']),
  child('GET …/samples/:id/file', ['T1', 'L']),
  child('GET …/samples/:id/thumbnail', ['T1', 'L']),
  child('DELETE …/samples/:id', ['T1'], ['L']),

  // Goals and ratings
  child('GET …/goals', ['T1', 'L']),
  child('POST …/goals', ['T1'], ['L']),
  child('POST …/goals/:id/ratings', ['T1'], ['L']),
  child('POST …/goals/:id/end', ['T1'], ['L']),

  // Letters. Approval is the lead's where the author is newly qualified; any other author approves their own letter.
  // A failed delivery is tried again by the lead; the therapist sees it. The administrator's retry comes with a list of
  // deliveries that shows state, attempts and time alone.
  area('GET /api/letters', clinical),
  child('GET …/letters', ['T1', 'L']),
  child('POST …/letters', ['T1'], ['L']),
  child('GET …/letters/:id', ['T1', 'L']),
  child('PUT …/letters/:id', ['T1'], ['L']),
  child('DELETE …/letters/:id', ['T1'], ['L']),
  // Answers about the text sent along and nothing else, at every pause in typing.
  { ...child('POST …/letters/:id/check', ['T1', 'L']), entries: 0 },
  child('POST …/letters/:id/submit', ['T1'], ['L']),
  child('POST …/letters/:id/approve', ['T1', 'L']),
  child('POST …/letters/:id/return', ['L'], ['T1']),
  child('POST …/letters/:id/take-back', ['T1'], ['L']),
  child('POST …/letters/:id/send', ['T1', 'L']),
  child('POST …/letters/:id/recall', ['T1', 'L']),
  child('GET …/letters/:id/pdf', ['T1', 'L']),
  child('POST …/letters/:id/deliveries/:id/retry', ['L'], ['T1']),

  // Seating and classroom advice
  child('GET …/school', ['T1', 'L']),
  child('POST …/advice', ['T1'], ['L']),
  child('POST …/advice/:id/end', ['T1'], ['L']),

  // The teacher's room: own classes; pupils only where the family shares
  area('GET /api/classes', ['teacher']),
  within('GET /api/classes/:id/pupils', ['teacher'], 'class', []),
  child('GET /api/pupils/:childId', ['E1']),
  child('POST /api/pupils/:childId/advice/:id/replies', ['E1']),

  // The carer's room: own children, own contact, own letters
  area('GET /api/my/children', ['guardian']),
  child('GET /api/my/children/:childId', ['G1']),
  child('PUT /api/my/children/:childId/contact', ['G1']),
  child('POST /api/my/children/:childId/consents', ['G1']),
  child('POST /api/my/children/:childId/consents/:id/withdraw', ['G1']),
  within('GET /api/my/letters/:id', ['guardian'], 'letter', ['G1']),
  within('GET /api/my/letters/:id/pdf', ['guardian'], 'letter', ['G1']),
  within('GET /api/my/deliveries/:id', ['guardian'], 'letter', ['G1']),

  // Own forms of carers and teachers, signed in: a request belongs to the one person who was asked. The therapist asks, and
  // the lead for a child who waits for one; what came back is read as the row of questionnaire responses says.
  child('GET …/answer-requests', ['T1', 'L']),
  child('GET …/answer-choices', ['T1', 'L']),
  child('POST …/answer-requests', ['T1', 'L']),
  child('POST …/answer-requests/:id/cancel', ['T1', 'L']),
  child('POST …/answer-requests/:id/remind', ['T1', 'L']),
  area('GET /api/my/to-answer', ['guardian']),
  child('GET /api/my/children/:childId/answer-requests/:id', ['G1']),
  child('PUT /api/my/children/:childId/answer-requests/:id', ['G1']),
  // That the request came back and that the answers are closed are two entries.
  { ...child('POST /api/my/children/:childId/answer-requests/:id/send', ['G1']), entries: 2 },
  area('GET /api/pupils/to-answer', ['teacher']),
  child('GET /api/pupils/:childId/answer-requests/:id', ['E1']),
  child('PUT /api/pupils/:childId/answer-requests/:id', ['E1']),
  { ...child('POST /api/pupils/:childId/answer-requests/:id/send', ['E1']), entries: 2 },
  // A carer without a sign-in: the link's secret and the child's birth date are the proof, checked in answerLinks.test.ts.
  open('POST /api/answer-links/open'),
  open('PUT /api/answer-links'),
  open('POST /api/answer-links/send'),

  // Schools, classes and who teaches them
  area('GET /api/schools', staff, 0),
  area('GET /api/class-choices', staff, 0),
  area('POST /api/schools', ['administrator']),
  area('POST /api/classes', ['administrator']),
  within('PUT /api/classes/:id', ['administrator'], 'clinic', ['AD']),

  // Users: the lead invites and disables staff, the administrator also changes roles
  area('GET /api/users', office),
  area('POST /api/invitations', office),
  within('PATCH /api/users/:id', ['administrator'], 'clinic', ['AD']),
  within('POST /api/users/:id/disable', office, 'clinic', ['L', 'AD']),
  within('POST /api/users/:id/enable', office, 'clinic', ['L', 'AD']),

  // Clinic settings: the lead decides; an administrator may see them
  area('GET /api/settings', office, 0),
  area('PUT /api/settings', ['clinicLead']),
  // Questionnaires as the clinic asks them belong to its settings: the lead decides, staff see what there is to ask. They
  // name no child and no person.
  area('GET /api/forms', staff, 0),
  // The edition that is made and the one it takes the place of are two entries.
  { ...area('POST /api/forms', ['clinicLead']), entries: 2 },
  within('POST /api/forms/:id/retire', ['clinicLead'], 'clinic', ['L']),
  within('POST /api/forms/:id/restore', ['clinicLead'], 'clinic', ['L']),
]
