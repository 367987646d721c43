import type { RouteRecordRaw } from 'vue-router'
import type { Role } from '@shared/roles.ts'
import { recordRoutes } from '@/router/recordRoutes.ts'
import { useSessionStore } from '@/stores/session.ts'

declare module 'vue-router' {
  interface RouteMeta {
    /** Open to people who are not signed in. */
    open?: boolean
    /** Roles that may come here; left out: every signed-in person. */
    roles?: readonly Role[]
    /** Name of the browser tab. Never a person's name: tab titles are kept in the browser's history. */
    title?: string
  }
}

const staff: readonly Role[] = ['therapist', 'clinicLead', 'administrator']
const therapists: readonly Role[] = ['therapist', 'clinicLead']
const managers: readonly Role[] = ['clinicLead', 'administrator']

const openRoutes: RouteRecordRaw[] = [
  {
    name: 'sign-in',
    path: '/sign-in',
    component: () => import('@/views/auth/SignInView.vue'),
    meta: { open: true, title: 'Sign in' },
  },
  {
    name: 'forgot-password',
    path: '/forgot-password',
    component: () => import('@/views/auth/ForgotPasswordView.vue'),
    meta: { open: true, title: 'Forgotten password' },
  },
  {
    name: 'reset-password',
    path: '/reset-password',
    component: () => import('@/views/auth/ResetPasswordView.vue'),
    meta: { open: true, title: 'Choose a new password' },
  },
  {
    name: 'invitation',
    path: '/invitation',
    component: () => import('@/views/auth/InvitationView.vue'),
    meta: { open: true, title: 'Your invitation' },
  },
  {
    name: 'answer-link',
    path: '/answer',
    component: () => import('@/views/answers/AnswerLinkView.vue'),
    meta: { open: true, title: 'Questions from the clinic' },
  },
]

const staffRoutes: RouteRecordRaw[] = [
  {
    name: 'today',
    path: '/today',
    component: () => import('@/views/today/TodayView.vue'),
    meta: { roles: staff, title: 'Today' },
  },
  {
    name: 'caseload',
    path: '/caseload',
    component: () => import('@/views/caseload/CaseloadView.vue'),
    meta: { roles: therapists, title: 'Caseload' },
  },
  {
    name: 'referrals',
    path: '/referrals',
    component: () => import('@/views/referrals/ReferralsView.vue'),
    meta: { roles: staff, title: 'Referrals' },
  },
  {
    name: 'referral-new',
    path: '/referrals/new',
    component: () => import('@/views/referrals/ReferralNewView.vue'),
    meta: { roles: ['administrator', 'clinicLead'], title: 'New referral' },
  },
  {
    name: 'referral',
    path: '/referrals/:referralId',
    props: true,
    component: () => import('@/views/referrals/ReferralView.vue'),
    meta: { roles: staff, title: 'Referral' },
  },
  {
    name: 'child',
    path: '/children/:childId',
    props: true,
    redirect: (to) => ({ name: 'child-glance', params: to.params }),
    component: () => import('@/views/children/ChildFrameView.vue'),
    meta: { roles: staff },
    children: recordRoutes,
  },
  {
    name: 'register',
    path: '/register',
    component: () => import('@/views/children/RegisterView.vue'),
    meta: { roles: ['administrator'], title: 'Register' },
  },
  {
    name: 'letters',
    path: '/letters',
    component: () => import('@/views/letters/LettersView.vue'),
    meta: { roles: therapists, title: 'Letters' },
  },
  {
    name: 'schools',
    path: '/schools',
    component: () => import('@/views/schools/SchoolsView.vue'),
    meta: { roles: staff, title: 'Schools' },
  },
  {
    name: 'review',
    path: '/review',
    component: () => import('@/views/review/ReviewView.vue'),
    meta: { roles: ['clinicLead'], title: 'Clinic review' },
  },
  {
    name: 'review-list',
    path: '/review/:figure',
    props: true,
    component: () => import('@/views/review/ReviewListView.vue'),
    meta: { roles: ['clinicLead'], title: 'Clinic review list' },
  },
  {
    name: 'settings',
    path: '/settings',
    component: () => import('@/views/settings/SettingsView.vue'),
    meta: { roles: managers, title: 'Settings' },
  },
  {
    name: 'forms',
    path: '/forms',
    component: () => import('@/views/forms/FormsView.vue'),
    meta: { roles: ['clinicLead'], title: 'Questionnaire forms' },
  },
  {
    name: 'people',
    path: '/people',
    component: () => import('@/views/users/PeopleView.vue'),
    meta: { roles: managers, title: 'People' },
  },
]

const familyRoutes: RouteRecordRaw[] = [
  {
    name: 'my-children',
    path: '/my-child',
    component: () => import('@/views/family/MyChildrenView.vue'),
    meta: { roles: ['guardian'], title: 'My children' },
  },
  {
    name: 'my-child',
    path: '/my-child/:childId',
    props: true,
    component: () => import('@/views/family/MyChildView.vue'),
    meta: { roles: ['guardian'], title: 'My child' },
  },
  {
    name: 'received-letter',
    path: '/my-child/:childId/letters/:letterId',
    props: true,
    component: () => import('@/views/family/ReceivedLetterView.vue'),
    meta: { roles: ['guardian'], title: 'A letter for you' },
  },
  {
    name: 'my-answers',
    path: '/my-child/:childId/answer/:requestId',
    props: true,
    component: () => import('@/views/family/AnswerView.vue'),
    meta: { roles: ['guardian'], title: 'Questions for you' },
  },
  {
    name: 'delivery',
    path: '/letter/:deliveryId',
    props: true,
    component: () => import('@/views/family/DeliveryView.vue'),
    meta: { roles: ['guardian'], title: 'Opening your letter' },
  },
]

const schoolRoutes: RouteRecordRaw[] = [
  {
    name: 'classes',
    path: '/classes',
    component: () => import('@/views/classes/MyClassesView.vue'),
    meta: { roles: ['teacher'], title: 'My classes' },
  },
  {
    name: 'class',
    path: '/classes/:classId',
    props: true,
    component: () => import('@/views/classes/ClassView.vue'),
    meta: { roles: ['teacher'], title: 'Class' },
  },
  {
    name: 'pupil',
    path: '/classes/:classId/pupils/:childId',
    props: true,
    component: () => import('@/views/classes/PupilView.vue'),
    meta: { roles: ['teacher'], title: 'Pupil' },
  },
  {
    name: 'pupil-answers',
    path: '/classes/:classId/pupils/:childId/answer/:requestId',
    props: true,
    component: () => import('@/views/classes/PupilAnswerView.vue'),
    meta: { roles: ['teacher'], title: 'Questions about a pupil' },
  },
]

/** First page of a person, by what they are to the clinic. */
export function homeFor(held: readonly Role[]): { name: string } {
  if (held.some((role) => staff.includes(role))) return { name: 'today' }
  if (held.includes('teacher')) return { name: 'classes' }
  if (held.includes('guardian')) return { name: 'my-children' }
  return { name: 'profile' }
}

export const routes: RouteRecordRaw[] = [
  {
    name: 'home',
    path: '/',
    redirect: () => {
      const user = useSessionStore().user
      return user ? homeFor(user.roles) : { name: 'sign-in' }
    },
  },
  ...openRoutes,
  ...staffRoutes,
  ...familyRoutes,
  ...schoolRoutes,
  {
    name: 'profile',
    path: '/profile',
    component: () => import('@/views/users/ProfileView.vue'),
    meta: { title: 'Your profile' },
  },
  {
    name: 'forbidden',
    path: '/forbidden',
    component: () => import('@/views/ForbiddenView.vue'),
    meta: { title: 'Not open to you' },
  },
  {
    name: 'not-found',
    path: '/:path(.*)*',
    component: () => import('@/views/NotFoundView.vue'),
    meta: { open: true, title: 'Page not found' },
  },
]
