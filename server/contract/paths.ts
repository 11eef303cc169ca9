/** Every address of the product, in one place. */
export const paths = {
  signIn: (next?: string) => (next ? `/sign-in?next=${encodeURIComponent(next)}` : '/sign-in'),
  home: () => '/',
  today: () => '/today',
  classes: () => '/classes',
  classPage: (scheduledClassId: string) => `/classes/${scheduledClassId}`,
  play: (scheduledClassId: string) => `/play/${scheduledClassId}`,
  tally: () => '/tally',
  attemptTally: (attemptId: string) => `/tally/${attemptId}`,
  health: () => '/health',
  board: () => '/board',
  boardAll: () => '/board/all',
  boardOf: (scheduledClassId: string) => `/board/${scheduledClassId}`,
  boardAttempt: (scheduledClassId: string, attemptId: string) =>
    `/board/${scheduledClassId}/attempts/${attemptId}`,
  planner: () => '/planner',
  plannedClass: (classId: string) => `/planner/${encodeURIComponent(classId)}`,
  library: () => '/library',
  newMovement: () => '/library/new',
  movement: (slug: string) => `/library/${encodeURIComponent(slug)}`,
  editMovement: (slug: string) => `/library/${encodeURIComponent(slug)}/edit`,
  gym: () => '/gym',
  account: () => '/account',
  api: {
    health: () => '/api/health',
    attemptEvents: (attemptId: string) => `/api/v1/attempts/${attemptId}/events`,
    attempt: (attemptId: string) => `/api/v1/attempts/${attemptId}`,
    board: (scheduledClassId: string) => `/api/v1/boards/${scheduledClassId}`,
    boardCsv: (scheduledClassId: string) => `/api/v1/boards/${scheduledClassId}/csv`,
    captions: (classId: string, kind: 'captions' | 'chapters') =>
      `/api/v1/classes/${encodeURIComponent(classId)}/captions?kind=${kind}`,
    live: (scheduledClassIds: readonly string[]) =>
      `/api/v1/live?boards=${scheduledClassIds.map(encodeURIComponent).join(',')}`,
  },
} as const
