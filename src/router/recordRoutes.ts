import type { RouteRecordRaw } from 'vue-router'

/** Sections of a child's record, below `/children/:childId` and inside its frame. */
export const recordRoutes: RouteRecordRaw[] = [
  {
    name: 'child-glance',
    path: 'glance',
    props: true,
    component: () => import('@/views/children/ChildGlanceView.vue'),
    meta: { title: 'At a glance' },
  },
  {
    name: 'child-hand-profile',
    path: 'hand-profile',
    props: true,
    component: () => import('@/views/children/ChildHandProfileView.vue'),
    meta: { title: 'Hand profile' },
  },
  {
    name: 'questionnaire',
    path: 'questionnaires/:questionnaireId',
    props: true,
    component: () => import('@/views/questionnaires/QuestionnaireView.vue'),
    meta: { title: 'Hand-use questionnaire' },
  },
  {
    name: 'child-handwriting',
    path: 'handwriting',
    props: true,
    component: () => import('@/views/children/ChildHandwritingView.vue'),
    meta: { title: 'Handwriting' },
  },
  {
    name: 'child-goals',
    path: 'goals',
    props: true,
    component: () => import('@/views/children/ChildGoalsView.vue'),
    meta: { title: 'Goals' },
  },
  {
    name: 'child-sessions',
    path: 'sessions',
    props: true,
    component: () => import('@/views/children/ChildSessionsView.vue'),
    meta: { title: 'Sessions' },
  },
  {
    name: 'session-note',
    path: 'sessions/:noteId',
    props: true,
    component: () => import('@/views/sessionNotes/SessionNoteView.vue'),
    meta: { title: 'Session note' },
  },
  {
    name: 'child-letters',
    path: 'letters',
    props: true,
    component: () => import('@/views/children/ChildLettersView.vue'),
    meta: { title: 'Letters of a child' },
  },
  {
    name: 'letter',
    path: 'letters/:letterId',
    props: true,
    component: () => import('@/views/letters/LetterView.vue'),
    meta: { title: 'Letter' },
  },
  {
    name: 'child-school',
    path: 'school',
    props: true,
    component: () => import('@/views/children/ChildSchoolView.vue'),
    meta: { title: 'School' },
  },
  {
    name: 'child-family',
    path: 'family',
    props: true,
    component: () => import('@/views/children/ChildFamilyView.vue'),
    meta: { title: 'Family and consent' },
  },
  {
    name: 'child-access',
    path: 'access',
    props: true,
    component: () => import('@/views/children/ChildAccessView.vue'),
    meta: { title: 'Access history' },
  },
]
