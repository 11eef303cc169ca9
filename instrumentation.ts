/** Runs once as the server starts. */
export async function register(): Promise<void> {
  if (process.env.NEXT_RUNTIME === 'nodejs') {
    const { closeStreamsAtTheEnd } = await import('./server/live/shutdown')
    closeStreamsAtTheEnd()
    const { noteSocketAddresses } = await import('./server/auth/address')
    noteSocketAddresses()
  }
}
