import 'server-only'
/**
 * One line of JSON an error, with the id that the person is shown. Names and stacks only: a message of
 * the database or of zod may quote what somebody typed, and that may be health data.
 */
export function logError(id: string, where: string, error: unknown): void {
  const stack = error instanceof Error ? (error.stack ?? '') : ''
  const line = {
    level: 'error',
    id,
    where,
    error: error instanceof Error ? error.name : typeof error,
    code:
      typeof error === 'object' && error !== null && 'code' in error
        ? String(error.code)
        : undefined,
    at: stack
      .split('\n')
      .filter((one) => one.trimStart().startsWith('at '))
      .slice(0, 6)
      .map((one) => one.trim()),
  }
  console.error(JSON.stringify(line))
}
