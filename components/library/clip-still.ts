import { MOST_BYTES } from '@/server/contract/media-types'

/** Wide enough for a television's half screen; a still is seen for a moment. */
const MOST_WIDTH = 1_280
/** Where a device takes longer to show one picture, the clip goes without a still. */
const PATIENCE_MS = 15_000
/** Of a clip that does not tell its length. */
const UNKNOWN_AT_SECONDS = 1

export interface ClipLook {
  /** False where this browser cannot play it, as members’ browsers then cannot. */
  plays: boolean
  /** JPEG; null where none could be made. */
  still: Blob | null
}

/** Looks at a clip before it is sent: whether it plays, and how it looks at a third of its length. */
export async function lookAtClip(file: Blob): Promise<ClipLook> {
  const video = document.createElement('video')
  const address = URL.createObjectURL(file)
  video.muted = true
  video.playsInline = true
  video.preload = 'auto'
  try {
    const loaded = happens(video, 'loadeddata')
    video.src = address
    if (!(await loaded)) return { plays: video.error === null, still: null }
    const sought = happens(video, 'seeked')
    video.currentTime = Number.isFinite(video.duration) ? video.duration / 3 : UNKNOWN_AT_SECONDS
    if (!(await sought)) return { plays: video.error === null, still: null }
    return { plays: true, still: await stillOf(video) }
  } finally {
    video.removeAttribute('src')
    video.load()
    URL.revokeObjectURL(address)
  }
}

/** Whether it came, before an error and before patience is over. */
function happens(video: HTMLVideoElement, type: string): Promise<boolean> {
  return new Promise((resolve) => {
    const timer = setTimeout(() => end(false), PATIENCE_MS)
    const good = () => end(true)
    const bad = () => end(false)
    const end = (came: boolean) => {
      clearTimeout(timer)
      video.removeEventListener(type, good)
      video.removeEventListener('error', bad)
      resolve(came)
    }
    video.addEventListener(type, good)
    video.addEventListener('error', bad)
  })
}

async function stillOf(video: HTMLVideoElement): Promise<Blob | null> {
  const { videoWidth, videoHeight } = video
  // A file with sound alone has no picture.
  if (videoWidth === 0 || videoHeight === 0) return null
  const scale = Math.min(1, MOST_WIDTH / videoWidth)
  const canvas = document.createElement('canvas')
  canvas.width = Math.round(videoWidth * scale)
  canvas.height = Math.round(videoHeight * scale)
  const context = canvas.getContext('2d')
  if (!context) return null
  context.drawImage(video, 0, 0, canvas.width, canvas.height)
  for (const quality of [0.8, 0.5]) {
    const still = await new Promise<Blob | null>((resolve) =>
      canvas.toBlob(resolve, 'image/jpeg', quality),
    )
    if (still && still.size <= MOST_BYTES.poster) return still
  }
  return null
}
