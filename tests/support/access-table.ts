/**
 * Who gets what, written down: every page, route handler and action by everybody who may knock. A page,
 * handler or action without a row here fails the test, and so does a row without its file.
 */
export const VISITORS = [
  'signed-out',
  'member',
  'other-member',
  'coach',
  'other-coach',
  'owner',
  'deactivated',
] as const
export type Visitor = (typeof VISITORS)[number]

/**
 * `ok`: shown or done. `sign-in`: led to sign-in. `on`: led elsewhere in the product. `404`, `401`, `400`: as
 * the status. `refused`: an action's answer with words, nothing changed.
 */
export type Outcome = 'ok' | 'sign-in' | 'on' | '404' | '401' | '400' | 'refused'
type Row = Record<Visitor, Outcome>

/** In the order of `VISITORS`. */
const row = (...outcomes: [Outcome, Outcome, Outcome, Outcome, Outcome, Outcome, Outcome]): Row =>
  Object.fromEntries(VISITORS.map((visitor, index) => [visitor, outcomes[index]])) as Row

export const PAGES: Record<string, Row> = {
  //                            out        member other  coach  coach2 owner  gone
  '/': row('sign-in', 'on', 'on', 'on', 'on', 'on', 'sign-in'),
  '/sign-in': row('ok', 'on', 'on', 'on', 'on', 'on', 'ok'),
  '/offline': row('ok', 'ok', 'ok', 'ok', 'ok', 'ok', 'ok'),
  '/today': row('sign-in', 'ok', 'ok', '404', '404', '404', 'sign-in'),
  '/classes': row('sign-in', 'ok', 'ok', '404', '404', '404', 'sign-in'),
  '/classes/[scheduledClassId]': row('sign-in', 'ok', 'ok', 'ok', '404', 'ok', 'sign-in'),
  '/play/[scheduledClassId]': row('sign-in', 'ok', 'ok', '404', '404', '404', 'sign-in'),
  '/tally': row('sign-in', 'ok', 'ok', '404', '404', '404', 'sign-in'),
  '/tally/[attemptId]': row('sign-in', 'ok', '404', '404', '404', '404', 'sign-in'),
  '/health': row('sign-in', 'ok', 'ok', '404', '404', '404', 'sign-in'),
  '/account': row('sign-in', 'ok', 'ok', 'ok', 'ok', 'ok', 'sign-in'),
  '/gym': row('sign-in', '404', '404', '404', '404', 'ok', 'sign-in'),
  '/board': row('sign-in', '404', '404', 'on', 'on', '404', 'sign-in'),
  '/board/all': row('sign-in', '404', '404', 'ok', 'ok', '404', 'sign-in'),
  '/board/[scheduledClassId]': row('sign-in', '404', '404', 'ok', '404', '404', 'sign-in'),
  '/board/[scheduledClassId]/attempts/[attemptId]': row(
    'sign-in',
    '404',
    '404',
    'ok',
    '404',
    '404',
    'sign-in',
  ),
  '/planner': row('sign-in', '404', '404', 'ok', 'ok', '404', 'sign-in'),
  '/planner/[classId]': row('sign-in', '404', '404', 'ok', '404', '404', 'sign-in'),
  '/library': row('sign-in', '404', '404', 'ok', 'ok', '404', 'sign-in'),
  '/library/new': row('sign-in', '404', '404', 'ok', 'ok', '404', 'sign-in'),
  '/library/[slug]': row('sign-in', '404', '404', 'ok', '404', '404', 'sign-in'),
  '/library/[slug]/edit': row('sign-in', '404', '404', 'ok', '404', '404', 'sign-in'),
}

export const HANDLERS: Record<string, Row> = {
  'GET /api/health': row('ok', 'ok', 'ok', 'ok', 'ok', 'ok', 'ok'),
  'POST /api/v1/attempts/[attemptId]/events': row('401', 'ok', '404', '404', '404', '404', '401'),
  'GET /api/v1/attempts/[attemptId]': row('401', 'ok', '404', 'ok', '404', '404', '401'),
  'GET /api/v1/boards/[scheduledClassId]': row('401', '404', '404', 'ok', '404', '404', '401'),
  'GET /api/v1/boards/[scheduledClassId]/csv': row('401', '404', '404', 'ok', '404', '404', '401'),
  'GET /api/v1/classes/[classId]/captions': row('401', '404', '404', 'ok', '404', '404', '401'),
  'GET /api/v1/live': row('401', '404', '404', 'ok', '404', '404', '401'),
  'GET /api/v1/movements/[slug]/options/[option]/media': row(
    '401',
    'ok',
    'ok',
    'ok',
    '404',
    'ok',
    '401',
  ),
  'GET /api/v1/movements/[slug]/options/[option]/media/poster': row(
    '401',
    'ok',
    'ok',
    'ok',
    '404',
    'ok',
    '401',
  ),
  'PUT /api/v1/movements/[slug]/options/[option]/media/poster': row(
    '401',
    '404',
    '404',
    'ok',
    '404',
    '404',
    '401',
  ),
  'PUT /api/v1/movements/[slug]/options/[option]/media': row(
    '401',
    '404',
    '404',
    'ok',
    '404',
    '404',
    '401',
  ),
  'DELETE /api/v1/movements/[slug]/options/[option]/media': row(
    '401',
    '404',
    '404',
    'ok',
    '404',
    '404',
    '401',
  ),
}

export const ACTIONS: Record<string, Row> = {
  // With a wrong password, so that nobody gets in.
  'account/signIn': row(
    'refused',
    'refused',
    'refused',
    'refused',
    'refused',
    'refused',
    'refused',
  ),
  'account/signOut': row(
    'sign-in',
    'sign-in',
    'sign-in',
    'sign-in',
    'sign-in',
    'sign-in',
    'sign-in',
  ),
  'account/signOutEverywhere': row(
    'sign-in',
    'sign-in',
    'sign-in',
    'sign-in',
    'sign-in',
    'sign-in',
    'sign-in',
  ),
  // With a wrong present password.
  'account/changePassword': row(
    'refused',
    'refused',
    'refused',
    'refused',
    'refused',
    'refused',
    'refused',
  ),
  // To the first gym, where the coach of the second is not.
  'account/switchGym': row('sign-in', 'on', 'on', 'on', '404', 'on', 'sign-in'),
  'health/saveHealthAnswers': row(
    'refused',
    'ok',
    'ok',
    'refused',
    'refused',
    'refused',
    'refused',
  ),
  // The member's own hold, by everybody as the coach.
  'health/clearHurtHold': row(
    'refused',
    'refused',
    'refused',
    'ok',
    'refused',
    'refused',
    'refused',
  ),
  'planned-classes/importCues': row(
    'refused',
    'refused',
    'refused',
    'ok',
    'refused',
    'refused',
    'refused',
  ),
  'fit/saveFit': row('refused', 'ok', 'ok', 'ok', 'ok', 'ok', 'refused'),
  'fit/saveOptionRule': row('refused', 'refused', 'refused', 'ok', 'refused', 'refused', 'refused'),
  // First of the library's: later the gym has a copy of its own.
  'library/backToBuiltIn': row(
    'refused',
    'refused',
    'refused',
    'ok',
    'refused',
    'refused',
    'refused',
  ),
  // A movement of the first gym; who saves it is led to its page.
  'library/saveMovement': row(
    'refused',
    'refused',
    'refused',
    'on',
    'refused',
    'refused',
    'refused',
  ),
  'library/archiveMovement': row(
    'refused',
    'refused',
    'refused',
    'ok',
    'refused',
    'refused',
    'refused',
  ),
  'library/bringBackMovement': row(
    'refused',
    'refused',
    'refused',
    'ok',
    'refused',
    'refused',
    'refused',
  ),
  'kit/saveOwnKit': row('refused', 'ok', 'ok', 'ok', 'ok', 'ok', 'refused'),
}
