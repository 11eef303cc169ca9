/** Where clips and pictures lie: the object store that S3_ENDPOINT names, or one of the project's own. */
import { mkdtemp, rm } from 'node:fs/promises'
import { tmpdir } from 'node:os'
import { startFakeS3 } from './fake-s3.mjs'
import { atTheEnd, HOME } from './steps.mjs'

/** The project's lasting store, ended with the command. `env`: what the product needs to use it. */
export async function startLastingStore() {
  if (process.env.S3_ENDPOINT) return { env: {}, remark: 'the one that S3_ENDPOINT names' }
  const store = await startFakeS3({ folder: `${HOME}/objects` })
  atTheEnd(store.close)
  return { env: store.env, remark: 'started' }
}

/** One that is thrown away at the end; tests never write to a store that somebody uses. */
export async function startThrowAwayStore() {
  const folder = await mkdtemp(`${tmpdir()}/floorside-objects-`)
  atTheEnd(() => rm(folder, { recursive: true, force: true }))
  const store = await startFakeS3({ folder })
  atTheEnd(store.close)
  return store.env
}
