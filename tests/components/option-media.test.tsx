import { act, fireEvent, render, screen, waitFor } from '@testing-library/react'
import userEvent from '@testing-library/user-event'
import { afterEach, beforeEach, describe, expect, test, vi } from 'vitest'
import type { ClipLook } from '@/components/library/clip-still'
import { OptionMediaEditor } from '@/components/library/option-media'
import type { OptionMedia } from '@/server/contract/media'
import { MOST_BYTES } from '@/server/contract/media-types'

const refresh = vi.hoisted(() => vi.fn())
vi.mock('next/navigation', () => ({ useRouter: () => ({ refresh }) }))
const look = vi.hoisted(() => vi.fn<(file: Blob) => Promise<ClipLook>>())
vi.mock('@/components/library/clip-still', () => ({ lookAtClip: look }))

/** Requests as the browser would make them, answered by the test. */
class FakeRequest extends EventTarget {
  static all: FakeRequest[] = []
  upload = new EventTarget()
  status = 0
  responseText = ''
  url = ''
  method = ''
  body: Blob | null = null
  isAborted = false
  headers: Record<string, string> = {}
  constructor() {
    super()
    FakeRequest.all.push(this)
  }
  open(method: string, url: string) {
    Object.assign(this, { method, url })
  }
  setRequestHeader(name: string, value: string) {
    this.headers[name] = value
  }
  send(body: Blob) {
    this.body = body
  }
  abort() {
    this.isAborted = true
    this.dispatchEvent(new Event('abort'))
  }
  async progress(loaded: number, total: number) {
    const event = new ProgressEvent('progress', { lengthComputable: true, loaded, total })
    await act(async () => this.upload.dispatchEvent(event))
  }
  async answer(status: number, body: object) {
    Object.assign(this, { status, responseText: JSON.stringify(body) })
    await act(async () => this.dispatchEvent(new Event('load')))
  }
  async breakOff() {
    await act(async () => this.dispatchEvent(new Event('error')))
  }
}

const URL_OF = '/api/v1/movements/goblet-squat/options/to-a-chair/media'
const PICTURE: OptionMedia = {
  mediaId: 'picture-1',
  kind: 'picture',
  contentType: 'image/png',
  bytes: 500,
  url: `${URL_OF}?v=picture-1`,
  posterUrl: null,
}
const CLIP: OptionMedia = {
  mediaId: 'clip-1',
  kind: 'clip',
  contentType: 'video/mp4',
  bytes: 4_000,
  url: `${URL_OF}?v=clip-1`,
  posterUrl: null,
}
const WITH_STILL: OptionMedia = { ...CLIP, posterUrl: `${URL_OF}/poster?v=still-1` }

const PNG = [0x89, 0x50, 0x4e, 0x47, 0x0d, 0x0a, 0x1a, 0x0a]
const MP4 = [...Buffer.from('\x00\x00\x00\x18ftypmp42\x00\x00\x00\x00isommp42', 'latin1')]
function fileOf(head: number[], name: string, type = '', size?: number): File {
  const file = new File([Uint8Array.from(head)], name, { type })
  if (size !== undefined) Object.defineProperty(file, 'size', { value: size })
  return file
}

function show(media: OptionMedia | null = null) {
  const element = (now: OptionMedia | null) => (
    <OptionMediaEditor
      movement="goblet-squat"
      option={{ option: 'to-a-chair', name: 'To a chair' }}
      media={now}
    />
  )
  const { rerender, unmount } = render(element(media))
  return { reload: (now: OptionMedia | null) => rerender(element(now)), unmount }
}
const chooser = () => screen.getByLabelText<HTMLInputElement>(/: clip or picture of To a chair$/)
const choose = (file: File) => userEvent.upload(chooser(), file, { applyAccept: false })
async function request(index: number): Promise<FakeRequest> {
  await waitFor(() => expect(FakeRequest.all.length).toBeGreaterThan(index))
  const found = FakeRequest.all[index]
  if (!found) throw new Error('no request')
  return found
}

beforeEach(() => {
  FakeRequest.all = []
  refresh.mockReset()
  look.mockReset()
  look.mockResolvedValue({ plays: true, still: new Blob(['still'], { type: 'image/jpeg' }) })
  vi.stubGlobal('XMLHttpRequest', FakeRequest)
  // jsdom's blobs have no such method.
  Blob.prototype.arrayBuffer ??= function arrayBuffer(this: Blob) {
    return new Promise((resolve) => {
      const reader = new FileReader()
      reader.onload = () => resolve(reader.result as ArrayBuffer)
      reader.readAsArrayBuffer(this)
    })
  }
  // Nor does it play anything.
  vi.spyOn(HTMLMediaElement.prototype, 'load').mockImplementation(() => undefined)
  vi.spyOn(HTMLMediaElement.prototype, 'play').mockImplementation(async () => undefined)
})
afterEach(() => {
  vi.restoreAllMocks()
  vi.unstubAllGlobals()
})

describe('a file that is chosen', () => {
  test('is sent as it is, tells how far it has come, and is then shown', async () => {
    show()
    expect(screen.getByText(/MP4 or WebM, 60 MB at most/)).toBeTruthy()
    const file = fileOf(PNG, 'squat.png', 'image/png')
    await choose(file)
    const sent = await request(0)
    expect([sent.method, sent.url, sent.body]).toEqual(['PUT', URL_OF, file])
    await sent.progress(42, 100)
    expect(screen.getByRole('progressbar').getAttribute('aria-valuenow')).toBe('42')
    expect(screen.getByRole('status').textContent).toBe('Sending squat.png')
    await sent.progress(100, 100)
    expect(screen.getByRole('status').textContent).toBe('Storing squat.png')
    await sent.answer(200, PICTURE)
    const image = await screen.findByRole('img', { name: 'To a chair, shown in a picture' })
    expect(image.getAttribute('src')).toBe(PICTURE.url)
    expect(screen.queryByRole('progressbar')).toBeNull()
    expect(look).not.toHaveBeenCalled()
    expect(refresh).toHaveBeenCalledTimes(1)
  })

  test('as a clip gets a still of its own, and is shown muted and looping', async () => {
    show()
    await choose(fileOf(MP4, 'squat.mp4', 'video/mp4'))
    await (await request(0)).answer(200, CLIP)
    const still = await request(1)
    expect(still.url).toBe(`${URL_OF}/poster?v=clip-1`)
    expect(still.headers['content-type']).toBe('image/jpeg')
    await still.answer(200, WITH_STILL)
    const clip = await screen.findByLabelText<HTMLVideoElement>('To a chair, shown in a clip')
    expect(clip.getAttribute('poster')).toBe(WITH_STILL.posterUrl)
    expect([clip.muted, clip.loop, clip.autoplay, clip.controls]).toEqual([true, true, true, false])
  })

  test('as a clip is shown where its still does not arrive', async () => {
    show()
    await choose(fileOf(MP4, 'squat.mp4', 'video/mp4'))
    await (await request(0)).answer(200, CLIP)
    await (await request(1)).breakOff()
    expect(await screen.findByLabelText('To a chair, shown in a clip')).toBeTruthy()
    expect(screen.queryByRole('alert')).toBeNull()
  })

  test.each([
    [
      'of another kind, whatever its name says',
      fileOf([0x47, 0x49, 0x46, 0x38], 'a.mp4', 'video/mp4'),
      /MP4 or WebM/,
    ],
    [
      'too large for a clip',
      fileOf(MP4, 'a.mp4', 'video/mp4', MOST_BYTES.clip + 1),
      /60 MB at most/,
    ],
    [
      'too large for a picture',
      fileOf(PNG, 'a.png', 'image/png', 12_000_000),
      /8 MB at most, and this has 12 MB/,
    ],
    ['empty', fileOf([], 'a.png', 'image/png'), /Choose a clip as MP4/],
  ])('is not sent where it is %s', async (_what, file, said) => {
    show()
    await choose(file)
    expect((await screen.findByRole('alert')).textContent).toMatch(said)
    expect(screen.queryByRole('button', { name: 'Try again' })).toBeNull()
    expect(FakeRequest.all).toEqual([])
  })

  test('is not sent where it is a clip that does not play', async () => {
    look.mockResolvedValueOnce({ plays: false, still: null })
    show()
    await choose(fileOf(MP4, 'a.mp4', 'video/mp4'))
    expect((await screen.findByRole('alert')).textContent).toMatch(/cannot play the clip/)
    expect(FakeRequest.all).toEqual([])
  })

  test('can be cancelled on its way: what was there stays, and the focus comes back', async () => {
    show(PICTURE)
    await choose(fileOf(MP4, 'squat.mp4', 'video/mp4'))
    const sent = await request(0)
    await sent.progress(10, 100)
    await userEvent.click(screen.getByRole('button', { name: 'Cancel' }))
    expect(sent.isAborted).toBe(true)
    expect(screen.queryByRole('progressbar')).toBeNull()
    expect(screen.queryByRole('alert')).toBeNull()
    expect(screen.getByRole('img').getAttribute('src')).toBe(PICTURE.url)
    expect(document.activeElement).toBe(chooser())
  })

  test('can be sent again after the connection broke off', async () => {
    show(PICTURE)
    const file = fileOf(PNG, 'squat.png', 'image/png')
    await choose(file)
    await (await request(0)).breakOff()
    expect(screen.getByRole('alert').textContent).toMatch(/broke off .* still there/)
    expect(screen.getByRole('img').getAttribute('src')).toBe(PICTURE.url)
    await userEvent.click(screen.getByRole('button', { name: 'Try again' }))
    const again = await request(1)
    expect(again.body).toBe(file)
    expect(screen.queryByRole('alert')).toBeNull()
    await again.answer(200, { ...PICTURE, mediaId: 'picture-2', url: `${URL_OF}?v=picture-2` })
    expect(screen.getByRole('img').getAttribute('src')).toBe(`${URL_OF}?v=picture-2`)
  })

  test('is refused in the server’s own words', async () => {
    show()
    await choose(fileOf(PNG, 'squat.png', 'image/png'))
    const message = 'There is no such option in the library.'
    await (await request(0)).answer(404, { error: { code: 'not-found', message } })
    expect(screen.getByRole('alert').textContent).toContain(message)
    expect(screen.queryByRole('button', { name: 'Try again' })).toBeNull()
  })

  test('is given up where the page is left', async () => {
    const { unmount } = show()
    await choose(fileOf(PNG, 'squat.png', 'image/png'))
    const sent = await request(0)
    unmount()
    expect(sent.isAborted).toBe(true)
  })

  test('may be dropped, one at a time and not while another is on its way', async () => {
    show()
    const group = screen.getByRole('group', { name: 'Clip or picture: To a chair' })
    const file = fileOf(PNG, 'a.png', 'image/png')
    fireEvent.drop(group, { dataTransfer: { files: [file, file] } })
    expect((await screen.findByRole('alert')).textContent).toMatch(/Drop one file/)
    fireEvent.drop(group, { dataTransfer: { files: [file] } })
    const sent = await request(0)
    expect(screen.queryByRole('alert')).toBeNull()
    fireEvent.drop(group, { dataTransfer: { files: [file] } })
    await sent.answer(200, PICTURE)
    expect(await screen.findByRole('img')).toBeTruthy()
    expect(FakeRequest.all).toHaveLength(1)
  })
})

describe('what an option has', () => {
  test('is removed after one question, and not without it', async () => {
    const send = vi.fn(async () => new Response('{"removed":true}'))
    vi.stubGlobal('fetch', send)
    show(PICTURE)
    await userEvent.click(screen.getByRole('button', { name: 'Remove' }))
    await userEvent.click(screen.getByRole('button', { name: 'Keep it as it is' }))
    expect(send).not.toHaveBeenCalled()
    await userEvent.click(screen.getByRole('button', { name: 'Remove' }))
    await userEvent.click(screen.getByRole('button', { name: 'Remove the picture' }))
    await waitFor(() => expect(screen.queryByRole('img')).toBeNull())
    expect(send).toHaveBeenCalledExactlyOnceWith(
      URL_OF,
      expect.objectContaining({ method: 'DELETE' }),
    )
    expect(document.activeElement).toBe(chooser())
    expect(refresh).toHaveBeenCalledTimes(1)
  })

  test('stays where it could not be removed, and that can be tried again', async () => {
    const send = vi
      .fn<() => Promise<Response>>()
      .mockRejectedValueOnce(new TypeError('Failed to fetch'))
      .mockResolvedValueOnce(new Response('{"removed":true}'))
    vi.stubGlobal('fetch', send)
    show(PICTURE)
    await userEvent.click(screen.getByRole('button', { name: 'Remove' }))
    await userEvent.click(screen.getByRole('button', { name: 'Remove the picture' }))
    expect((await screen.findByRole('alert')).textContent).toMatch(/nothing was removed/)
    expect(screen.getByRole('img')).toBeTruthy()
    await userEvent.click(screen.getByRole('button', { name: 'Try again' }))
    await waitFor(() => expect(screen.queryByRole('img')).toBeNull())
  })

  test('follows the page where that was loaded anew', () => {
    const { reload } = show(PICTURE)
    reload(WITH_STILL)
    expect(screen.getByLabelText('To a chair, shown in a clip')).toBeTruthy()
    reload(null)
    expect(screen.queryByLabelText('To a chair, shown in a clip')).toBeNull()
  })

  test('says so where it cannot be shown', () => {
    show(PICTURE)
    fireEvent.error(screen.getByRole('img'))
    expect(screen.getByRole('alert').textContent).toMatch(/load the page anew/)
  })

  test('as a clip stands still until it is started where motion is unwanted', () => {
    vi.spyOn(window, 'matchMedia').mockImplementation(
      (media) => Object.assign(new EventTarget(), { media, matches: true }) as MediaQueryList,
    )
    show(WITH_STILL)
    const clip = screen.getByLabelText<HTMLVideoElement>('To a chair, shown in a clip')
    expect([clip.autoplay, clip.controls]).toEqual([false, true])
  })
})

describe('a look at a clip', () => {
  /** The browser’s own parts, as far as a look needs them. */
  async function lookWith(clip: {
    duration?: number
    width?: number
    fails?: boolean
    stillBytes?: number[]
  }) {
    const { duration = 9, width = 1_920, fails = false, stillBytes = [200_000] } = clip
    const asked: { at: number[]; drawn: unknown[][]; qualities: unknown[]; size: number[] } = {
      at: [],
      drawn: [],
      qualities: [],
      size: [],
    }
    URL.createObjectURL = () => 'blob:clip'
    URL.revokeObjectURL = vi.fn()
    const video = HTMLVideoElement.prototype
    vi.spyOn(video, 'videoWidth', 'get').mockReturnValue(width)
    vi.spyOn(video, 'videoHeight', 'get').mockReturnValue((width * 9) / 16)
    vi.spyOn(video, 'duration', 'get').mockReturnValue(duration)
    // jsdom's has none to be spied on.
    Object.defineProperty(video, 'error', {
      configurable: true,
      get: () => (fails ? { code: 4 } : null),
    })
    vi.spyOn(video, 'src', 'set').mockImplementation(function (this: HTMLVideoElement) {
      queueMicrotask(() => this.dispatchEvent(new Event(fails ? 'error' : 'loadeddata')))
    })
    vi.spyOn(video, 'currentTime', 'set').mockImplementation(function (
      this: HTMLVideoElement,
      at: number,
    ) {
      asked.at.push(at)
      queueMicrotask(() => this.dispatchEvent(new Event('seeked')))
    })
    const canvas = HTMLCanvasElement.prototype
    vi.spyOn(canvas, 'getContext').mockReturnValue({
      drawImage: (...args: unknown[]) => asked.drawn.push(args),
    } as never)
    const sizes = [...stillBytes]
    vi.spyOn(canvas, 'toBlob').mockImplementation(function (
      this: HTMLCanvasElement,
      give,
      type,
      quality,
    ) {
      asked.qualities.push(quality)
      asked.size = [this.width, this.height]
      const blob = new Blob(['x'], { type: type ?? '' })
      Object.defineProperty(blob, 'size', { value: sizes.shift() ?? 0 })
      give(blob)
    })
    const { lookAtClip } = await vi.importActual<{ lookAtClip: typeof look }>(
      '@/components/library/clip-still',
    )
    return { look: await lookAtClip(new Blob(['clip'])), asked }
  }

  test('takes a JPEG from a third of its length, no wider than is of use', async () => {
    const { look: found, asked } = await lookWith({ duration: 9 })
    expect(found.plays).toBe(true)
    expect(found.still?.type).toBe('image/jpeg')
    expect(asked.at).toEqual([3])
    expect(asked.size).toEqual([1_280, 720])
    expect(URL.revokeObjectURL).toHaveBeenCalledWith('blob:clip')
  })

  test('of unknown length takes it from its beginning', async () => {
    const { asked } = await lookWith({ duration: Infinity })
    expect(asked.at).toEqual([1])
  })

  test('makes the still coarser where it would be too large, and goes without in the end', async () => {
    const { look: found, asked } = await lookWith({ stillBytes: [1_400_000, 700_000] })
    expect([found.still?.size, asked.qualities]).toEqual([700_000, [0.8, 0.5]])
    const { look: none } = await lookWith({ stillBytes: [1_400_000, 1_100_000] })
    expect(none).toEqual({ plays: true, still: null })
  })

  test('says of one that this browser cannot read that it does not play', async () => {
    expect((await lookWith({ fails: true })).look).toEqual({ plays: false, still: null })
  })

  test('of a file with sound alone gives no still', async () => {
    expect((await lookWith({ width: 0 })).look).toEqual({ plays: true, still: null })
  })
})
