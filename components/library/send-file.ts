import type { ErrorBody } from '@/server/contract/errors'
import type { OptionMedia } from '@/server/contract/media'

const BROKE_OFF =
  'The connection broke off before all had arrived. Nothing was changed: what was there is still there.'
const NO_WORDS = 'The server did not take it and said nothing more. Nothing was changed.'

/** Why something was not sent. `again`: whether the same may go well another time. */
export class SendError extends Error {
  readonly again: boolean
  constructor(message: string, again: boolean) {
    super(message)
    this.name = 'SendError'
    this.again = again
  }
}

export interface Sending {
  /** Null where it was cancelled. Rejects with a `SendError`. */
  done: Promise<OptionMedia | null>
  cancel: () => void
}

/** Puts a file to an address. `onShare` hears the share that has left, from 0 to 1: only this kind of request tells. */
export function sendFile(url: string, file: Blob, onShare: (share: number) => void): Sending {
  const request = new XMLHttpRequest()
  const done = new Promise<OptionMedia | null>((resolve, reject) => {
    request.upload.addEventListener('progress', (event) => {
      if (event.lengthComputable && event.total > 0) onShare(event.loaded / event.total)
    })
    request.addEventListener('abort', () => resolve(null))
    request.addEventListener('error', () => reject(new SendError(BROKE_OFF, true)))
    request.addEventListener('load', () => {
      const body = read(request.responseText)
      if (request.status >= 200 && request.status < 300 && body && 'mediaId' in body) resolve(body)
      else reject(refusal(request.status, body))
    })
  })
  request.open('PUT', url)
  request.setRequestHeader('content-type', file.type || 'application/octet-stream')
  request.send(file)
  return { done, cancel: () => request.abort() }
}

/** Removes what is at an address. Rejects with a `SendError`. */
export async function removeFile(url: string): Promise<void> {
  let answer: Response
  let text: string
  try {
    answer = await fetch(url, {
      method: 'DELETE',
      headers: { 'content-type': 'application/json' },
    })
    text = await answer.text()
  } catch {
    throw new SendError('The gym’s server could not be reached, so nothing was removed.', true)
  }
  if (!answer.ok) throw refusal(answer.status, read(text))
}

function refusal(status: number, body: OptionMedia | ErrorBody | null): SendError {
  const message = body && 'error' in body ? body.error.message : NO_WORDS
  // Cut short on the way (400 of a file that was looked at before), signed out, or busy: it may go well later.
  return new SendError(message, status !== 404 && status !== 409 && status !== 413)
}

function read(text: string): OptionMedia | ErrorBody | null {
  try {
    const body: unknown = JSON.parse(text)
    return typeof body === 'object' && body !== null ? (body as OptionMedia | ErrorBody) : null
  } catch {
    return null
  }
}
