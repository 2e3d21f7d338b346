import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest'
import type { Painter } from '../../../../utils/lattice/painter'
import type { PictureLook, PictureRequest, PictureSource } from '../../../../utils/lattice/picture'
import { RASTER_DEFAULTS, RasterLayer } from '../../../../utils/lattice/raster-layer'

/** A painter that notes what it is asked for and hands over when told to. */
function slowPainter() {
  const asked: PictureRequest[] = []
  const waiting: ((bitmap: ImageBitmap) => void)[] = []
  const painter: Painter = {
    of: () => {},
    show: () => {},
    paint(request) {
      asked.push(request)
      return new Promise((resolve) => waiting.push(resolve))
    },
    kill: () => {},
  }
  const deliver = async () => {
    waiting.shift()?.({ close: () => {} } as ImageBitmap)
    await vi.advanceTimersByTimeAsync(0)
  }
  const deliverAll = async () => {
    while (waiting.length > 0) await deliver()
  }
  return { painter, asked, waiting, deliver, deliverAll }
}

const canvas = () =>
  ({
    style: {} as Record<string, string>,
    getContext: () => ({ transferFromImageBitmap: () => {}, drawImage: () => {} }),
  }) as unknown as HTMLCanvasElement & { style: Record<string, string> }

const at = (x: number, scale = 8) => ({ scale, x, y: 0 })

function setUp() {
  const [front, back] = [canvas(), canvas()]
  const slow = slowPainter()
  const events = { onPainted: vi.fn(), onMap: vi.fn(), onFailure: vi.fn() }
  const layer = new RasterLayer(front, back, slow.painter, events)
  layer.resize(400, 300)
  layer.of({} as PictureSource, { x1: 0, y1: 0, x2: 100, y2: 50 })
  layer.show({} as PictureLook)
  layer.follow(at(0))
  return { layer, front, back, events, ...slow }
}

beforeEach(() => {
  vi.useFakeTimers()
  vi.stubGlobal('window', { devicePixelRatio: 2, setTimeout, clearTimeout })
})
afterEach(() => {
  vi.useRealTimers()
  vi.unstubAllGlobals()
})

describe('the raster layer', () => {
  it('asks for the view with a margin first, then for the map and the whole machine, one at a time', async () => {
    const { asked, waiting, events, deliver, deliverAll } = setUp()
    expect(asked).toEqual([{ view: { scale: 8, x: 140, y: 105 }, width: 680, height: 510, ratio: 2, kind: 'rest' }])
    expect(waiting).toHaveLength(1)
    await deliver()
    expect(events.onPainted).toHaveBeenCalledOnce()
    await deliverAll()
    expect(asked.map(({ width, kind }) => [width, kind])).toEqual([
      [680, 'rest'],
      [57, 'map'],
      [RASTER_DEFAULTS.overview, 'whole'],
    ])
    expect(events.onMap).toHaveBeenCalledOnce()
  })

  it('only moves the picture while the camera moves, and paints it anew at rest', async () => {
    const { layer, front, asked, deliverAll } = setUp()
    await deliverAll()
    for (let x = 1; x <= 50; x++) {
      layer.follow(at(x))
      await vi.advanceTimersByTimeAsync(16)
    }
    expect(asked).toHaveLength(3)
    expect(front.style.transform).toBe('translate(-90px, -105px) scale(1)')
    await vi.advanceTimersByTimeAsync(RASTER_DEFAULTS.restMilliseconds)
    expect(asked).toHaveLength(4)
    expect(asked[3]!.view).toEqual({ scale: 8, x: 190, y: 105 })
  })

  it('asks again on the way when the margin runs out, more coarsely and for the latest view', async () => {
    const { layer, asked, deliver, deliverAll } = setUp()
    await deliverAll()
    layer.follow(at(100))
    expect(asked.at(-1)).toMatchObject({ view: { x: 240 }, ratio: 1 })
    layer.follow(at(300))
    layer.follow(at(380))
    expect(asked).toHaveLength(4)
    await deliver()
    expect(asked).toHaveLength(5)
    expect(asked.at(-1)!.view.x).toBe(520)
  })

  it('shows the whole machine beneath where the picture does not reach', async () => {
    const { layer, back, deliverAll } = setUp()
    await deliverAll()
    layer.follow(at(60))
    expect(back.style.visibility).toBe('hidden')
    layer.follow(at(200))
    expect(back.style.visibility).toBe('visible')
    // The whole machine is 900 pixels wide for 100 lines, so 8 pixels a line are a stretch of 8 / 9.
    expect(back.style.transform).toBe(`translate(200px, 0px) scale(${8 / 9})`)
  })

  it('paints again for another look without a word of the camera, and stops when it is over', async () => {
    const { layer, asked, events, waiting, deliverAll } = setUp()
    await deliverAll()
    layer.show({} as PictureLook)
    expect(asked).toHaveLength(4)
    layer.kill()
    waiting[0]!({ close: events.onFailure } as unknown as ImageBitmap)
    await vi.advanceTimersByTimeAsync(1000)
    expect(events.onFailure).toHaveBeenCalledOnce()
    expect(events.onPainted).toHaveBeenCalledOnce()
    expect(asked).toHaveLength(4)
  })

  it('says so when painting fails, and asks no more', async () => {
    const { layer, events, painter, asked, deliverAll } = setUp()
    await deliverAll()
    painter.paint = () => Promise.reject(new Error('no memory'))
    layer.follow(at(50))
    await vi.advanceTimersByTimeAsync(500)
    layer.follow(at(51))
    await vi.advanceTimersByTimeAsync(500)
    expect(events.onFailure.mock.calls).toEqual([['no memory']])
    expect(asked).toHaveLength(3)
  })
})
