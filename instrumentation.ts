/** Runs once as the server starts. */
export async function register(): Promise<void> {
  if (process.env.NEXT_RUNTIME !== 'nodejs') return
  const { closeAllStreams } = await import('./server/live/registry')
  for (const signal of ['SIGTERM', 'SIGINT'] as const) process.once(signal, closeAllStreams)
}
