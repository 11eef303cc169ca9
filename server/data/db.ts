import 'server-only'
/** The database that pages, actions and handlers hand to data functions. */
export { database as defaultDb } from '@/db/client'
