import { createPicture } from './picture'
import type { PictureLook, PictureRequest, PictureSource } from './picture'

/** Paints pictures of the lattice away from what the page is doing. */
export interface Painter {
  of(source: PictureSource): void
  show(look: PictureLook): void
  /** One at a time: the next picture may be asked for when this one is there. */
  paint(request: PictureRequest): Promise<ImageBitmap>
  kill(): void
}

export type PainterMessage =
  /** The machine is left out when it is the one sent last: it is by far the largest part. */
  | { readonly kind: 'of'; readonly data: PictureSource['data'] | null; readonly source: Omit<PictureSource, 'data'> }
  | { readonly kind: 'show'; readonly look: PictureLook }
  | { readonly kind: 'paint'; readonly request: PictureRequest }

export type PainterAnswer = { readonly bitmap: ImageBitmap } | { readonly failure: string }

/** In a worker where the browser lets one paint, else in slices between frames. */
export const createPainter = (): Painter =>
  typeof Worker === 'undefined' || typeof OffscreenCanvas === 'undefined'
    ? createSlicedPainter()
    : createWorkerPainter()

function createWorkerPainter(): Painter {
  const worker = new Worker(new URL('./painter.worker.ts', import.meta.url), { type: 'module' })
  const send = (message: PainterMessage) => worker.postMessage(message)
  let sent: PictureSource['data'] | null = null
  let settle: { resolve: (bitmap: ImageBitmap) => void; reject: (reason: Error) => void } | null = null
  worker.onmessage = ({ data }: MessageEvent<PainterAnswer>) => {
    if ('bitmap' in data) settle?.resolve(data.bitmap)
    else settle?.reject(new Error(data.failure))
    settle = null
  }
  worker.onerror = ({ message }) => settle?.reject(new Error(message))
  return {
    of({ data, ...source }) {
      send({ kind: 'of', data: data === sent ? null : data, source })
      sent = data
    },
    show: (look) => send({ kind: 'show', look }),
    paint: (request) =>
      new Promise((resolve, reject) => {
        settle = { resolve, reject }
        send({ kind: 'paint', request })
      }),
    kill: () => worker.terminate(),
  }
}

/** Longest stretch of painting between two frames, in milliseconds. */
const SLICE_MILLISECONDS = 12

function createSlicedPainter(): Painter {
  const picture = createPicture()
  const canvas = document.createElement('canvas')
  let isKilled = false
  return {
    of: picture.of,
    show: picture.show,
    async paint(request) {
      canvas.width = Math.round(request.width * request.ratio)
      canvas.height = Math.round(request.height * request.ratio)
      const ctx = canvas.getContext('2d', { alpha: false, willReadFrequently: true })
      if (!ctx) throw new Error('This browser offers no canvas.')
      let start = performance.now()
      for (const _ of picture.paint(ctx, request)) {
        if (isKilled || performance.now() - start < SLICE_MILLISECONDS) continue
        await new Promise(requestAnimationFrame)
        start = performance.now()
      }
      return createImageBitmap(canvas)
    },
    kill: () => void (isKilled = true),
  }
}
