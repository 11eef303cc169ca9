'use client'
import clsx from 'clsx'
import { useRouter } from 'next/navigation'
import { useEffect, useId, useRef, useState, type DragEvent } from 'react'
import { Button, buttonClass } from '@/components/ui/button'
import { ConfirmButton } from '@/components/ui/confirm-button'
import { Notice } from '@/components/ui/notice'
import { useMedia } from '@/hooks/use-media'
import { mediaPaths, type OptionMedia } from '@/server/contract/media'
import {
  HEAD_BYTES,
  mediaTypeOf,
  MOST_BYTES,
  tooLargeText,
  WRONG_TYPE,
  type MediaKind,
} from '@/server/contract/media-types'
import { lookAtClip } from './clip-still'
import { removeFile, SendError, sendFile, type Sending } from './send-file'

const DOES_NOT_PLAY =
  'This browser cannot play the clip, so members could not see it either. Export it as MP4 with H.264, or as WebM.'
const ONE_EACH = 'An option has one clip or picture. Drop one file.'
const ACCEPTED = 'video/mp4,video/webm,image/jpeg,image/png,image/webp'

type State =
  | { is: 'at-rest' }
  | { is: 'looking'; name: string }
  | { is: 'sending'; name: string; share: number }
  | { is: 'removing' }
  | { is: 'failed'; message: string; again: (() => void) | null }

interface OptionMediaProps {
  movement: string
  option: { option: string; name: string }
  /** What the option has; null for nothing. */
  media: OptionMedia | null
}

/** The coach's own clip or picture of one option: looked at, put, replaced and removed. */
export function OptionMediaEditor({ movement, option, media: given }: OptionMediaProps) {
  const router = useRouter()
  const [media, setMedia] = useState(given)
  const [seen, setSeen] = useState(given)
  const [state, setState] = useState<State>({ is: 'at-rest' })
  const [isOver, setOver] = useState(false)
  const sending = useRef<Sending | null>(null)
  /** Counts attempts: what an older one still has to say is not listened to. */
  const turn = useRef(0)
  const input = useRef<HTMLInputElement>(null)
  const id = useId()
  const path = mediaPaths.media(movement, option.option)
  const isBusy = state.is === 'looking' || state.is === 'sending' || state.is === 'removing'

  // The page was loaded anew: what it says stands over what was done here before.
  if (given !== seen) {
    setSeen(given)
    setMedia(given)
  }

  useEffect(
    () => () => {
      turn.current += 1
      sending.current?.cancel()
    },
    [],
  )

  function show(next: OptionMedia | null) {
    setMedia(next)
    router.refresh()
  }

  function fail(error: unknown, retry: () => void) {
    const told = error instanceof SendError ? error : new SendError(UNKNOWN, true)
    setState({ is: 'failed', message: told.message, again: told.again ? retry : null })
  }

  async function put(file: File) {
    if (isBusy) return
    turn.current += 1
    const mine = turn.current
    const isMine = () => turn.current === mine
    try {
      setState({ is: 'looking', name: file.name })
      const kind = await kindOf(file)
      const look = kind === 'clip' ? await lookAtClip(file) : null
      if (!isMine()) return
      if (look && !look.plays) throw new SendError(DOES_NOT_PLAY, false)
      setState({ is: 'sending', name: file.name, share: 0 })
      sending.current = sendFile(path, file, (share) => {
        if (isMine()) setState({ is: 'sending', name: file.name, share })
      })
      const put = await sending.current.done
      if (!isMine() || !put) return
      show(look?.still ? await withStill(put, look.still) : put)
      setState({ is: 'at-rest' })
    } catch (error) {
      if (isMine()) fail(error, () => void put(file))
    } finally {
      if (isMine()) sending.current = null
    }
  }

  /** A clip is whole without its still, which is only what shows before it plays. */
  async function withStill(clip: OptionMedia, still: Blob): Promise<OptionMedia> {
    const to = mediaPaths.poster(movement, option.option, clip.mediaId)
    try {
      return (await sendFile(to, still, () => undefined).done) ?? clip
    } catch {
      return clip
    }
  }

  function cancel() {
    turn.current += 1
    sending.current?.cancel()
    sending.current = null
    setState({ is: 'at-rest' })
    input.current?.focus()
    // It may have arrived in the same moment.
    router.refresh()
  }

  async function remove() {
    setState({ is: 'removing' })
    try {
      await removeFile(path)
      show(null)
      setState({ is: 'at-rest' })
      input.current?.focus()
    } catch (error) {
      fail(error, () => void remove())
    }
  }

  function drop(event: DragEvent) {
    event.preventDefault()
    setOver(false)
    const [file, ...more] = event.dataTransfer.files
    if (more.length > 0) setState({ is: 'failed', message: ONE_EACH, again: null })
    else if (file) void put(file)
  }

  return (
    <div
      role="group"
      aria-label={`Clip or picture: ${option.name}`}
      className={clsx('border-4 p-3', isOver ? 'border-on-present bg-present' : 'border-fill')}
      onDragOver={(event) => {
        event.preventDefault()
        setOver(!isBusy)
      }}
      onDragLeave={() => setOver(false)}
      onDrop={drop}
    >
      {media ? <Shown key={media.mediaId} media={media} name={option.name} /> : null}
      <div className="space-y-3">
        {media ? null : (
          <p id={`${id}-hint`} className={isOver ? 'text-on-present' : 'text-text-quiet'}>
            Drop a clip (MP4 or WebM, {MOST_BYTES.clip / 1_000_000} MB at most) or a picture (JPEG,
            PNG or WebP, {MOST_BYTES.picture / 1_000_000} MB at most) here.
          </p>
        )}
        {isBusy ? <Progress state={state} onCancel={cancel} /> : null}
        {state.is === 'failed' ? (
          <Notice tone="error">
            {state.message}
            {state.again ? (
              <Button look="text" className="ml-2" onClick={state.again}>
                Try again
              </Button>
            ) : null}
          </Notice>
        ) : null}
        <div className="flex flex-wrap gap-3">
          <label
            className={buttonClass(
              'outlined',
              clsx(
                'relative has-focus-visible:shadow-[0_0_0_2px_var(--text)] has-focus-visible:outline-4 has-focus-visible:outline-offset-2 has-focus-visible:outline-present',
                isBusy && 'opacity-60',
              ),
            )}
          >
            {media ? 'Replace' : 'Choose a file'}
            <span className="sr-only">: clip or picture of {option.name}</span>
            <input
              ref={input}
              type="file"
              accept={ACCEPTED}
              aria-disabled={isBusy}
              {...(media ? {} : { 'aria-describedby': `${id}-hint` })}
              className="sr-only"
              onClick={(event) => {
                if (isBusy) event.preventDefault()
              }}
              onChange={(event) => {
                const file = event.target.files?.[0]
                if (file) void put(file)
                // The same file may be chosen again after it was mended.
                event.target.value = ''
              }}
            />
          </label>
          {media ? (
            <ConfirmButton
              title={`Remove the ${media.kind}?`}
              explanation={`Members see the drawn figure of ${option.name} again, in every class that has it. The file is deleted here: keep your own copy.`}
              confirm={`Remove the ${media.kind}`}
              disabled={isBusy}
              onConfirm={() => void remove()}
            >
              Remove
            </ConfirmButton>
          ) : null}
        </div>
      </div>
    </div>
  )
}

const UNKNOWN = 'The file could not be read on this device. Choose it once more.'

/** By its bytes, as the server will tell it. Throws a `SendError` for a file that would be refused. */
async function kindOf(file: File): Promise<MediaKind> {
  const type = mediaTypeOf(new Uint8Array(await file.slice(0, HEAD_BYTES).arrayBuffer()))
  if (!type) throw new SendError(WRONG_TYPE, false)
  if (file.size > MOST_BYTES[type.kind]) {
    throw new SendError(tooLargeText(type.kind, file.size), false)
  }
  return type.kind
}

function Shown({ media, name }: { media: OptionMedia; name: string }) {
  const isStill = useMedia('(prefers-reduced-motion: reduce)')
  const [isGone, setGone] = useState(false)
  if (isGone) {
    return (
      <Notice tone="error" className="mb-3">
        This {media.kind} cannot be shown. It may have been replaced meanwhile: load the page anew.
      </Notice>
    )
  }
  const className = 'mb-3 aspect-video w-full bg-fill object-contain'
  return media.kind === 'clip' ? (
    <video
      src={media.url}
      {...(media.posterUrl === null ? {} : { poster: media.posterUrl })}
      aria-label={`${name}, shown in a clip`}
      muted
      loop
      playsInline
      autoPlay={!isStill}
      controls={isStill}
      onError={() => setGone(true)}
      className={className}
    />
  ) : (
    // Behind sign-in and of any size: nothing that an optimizer on the server could read.
    // eslint-disable-next-line @next/next/no-img-element
    <img
      src={media.url}
      alt={`${name}, shown in a picture`}
      onError={() => setGone(true)}
      className={className}
    />
  )
}

function Progress({ state, onCancel }: { state: State; onCancel: () => void }) {
  if (state.is === 'removing') return <p role="status">Removing</p>
  if (state.is !== 'looking' && state.is !== 'sending') return null
  const percent = state.is === 'sending' ? Math.floor(state.share * 100) : 0
  // All has left, and the server is still storing it.
  const isArriving = percent === 100
  return (
    <div>
      <p className="flex flex-wrap justify-between gap-x-4">
        <span role="status" className="min-w-0 [overflow-wrap:anywhere]">
          {state.is === 'looking' ? 'Looking at' : isArriving ? 'Storing' : 'Sending'} {state.name}
        </span>
        {state.is === 'sending' ? (
          <span aria-hidden className="figures text-2xl">
            {percent} %
          </span>
        ) : null}
      </p>
      <div className="mt-2 flex items-center gap-4">
        <div
          role="progressbar"
          aria-label={`Sending ${state.name}`}
          {...(state.is === 'sending' ? { 'aria-valuenow': percent } : {})}
          className="h-5 min-w-0 flex-1 border-4 border-line"
        >
          <div className="h-full bg-present" style={{ width: `${percent}%` }} />
        </div>
        <Button look="text" onClick={onCancel}>
          Cancel
        </Button>
      </div>
    </div>
  )
}
