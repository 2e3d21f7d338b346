import { createPicture } from './picture'
import type { PictureRequest, PictureSource } from './picture'
import type { PainterAnswer, PainterMessage } from './painter'

interface Scope {
  onmessage: ((event: MessageEvent<PainterMessage>) => void) | null
  postMessage(answer: PainterAnswer, transfer: Transferable[]): void
}

const scope = globalThis as unknown as Scope
const picture = createPicture()
const canvas = new OffscreenCanvas(1, 1)

function paint(request: PictureRequest): ImageBitmap {
  canvas.width = Math.round(request.width * request.ratio)
  canvas.height = Math.round(request.height * request.ratio)
  // By the processor: it is quicker at thousands of hairlines than an emulated graphics card.
  const ctx = canvas.getContext('2d', { alpha: false, willReadFrequently: true })
  if (!ctx) throw new Error('This browser lets no worker paint.')
  for (const _ of picture.paint(ctx, request));
  return canvas.transferToImageBitmap()
}

let machine: PictureSource['data'] | null = null

scope.onmessage = ({ data: message }) => {
  if (message.kind === 'of') {
    machine = message.data ?? machine
    if (machine) picture.of({ data: machine, ...message.source })
  } else if (message.kind === 'show') picture.show(message.look)
  else {
    let answer: PainterAnswer
    try {
      answer = { bitmap: paint(message.request) }
    } catch (error) {
      answer = { failure: error instanceof Error ? error.message : String(error) }
    }
    scope.postMessage(answer, 'bitmap' in answer ? [answer.bitmap] : [])
  }
}
