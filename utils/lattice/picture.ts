import type { ChainHues } from '~/utils/hues'
import { chainGeometry } from './geometry'
import type { ChainGeometry } from './geometry'
import type { Ground } from './ground'
import type { Canvas2D } from './paint-edges'
import { paintFabric, paintGround } from './paint-ground'
import { levelScene, paintScene, sceneScale } from './paint-scene'
import type { LevelledScene } from './paint-scene'
import { buildScene } from './scene'
import type { SceneInput } from './scene-types'
import { tailsOf } from './tails'
import type { ChainLayer, LatticeData, MarkLayer, View } from './types'

/** What the picture is of. Plain data, so that it can be sent to a worker; the same for as long as the embedding is. */
export interface PictureSource {
  readonly data: LatticeData
  readonly chains: ChainLayer
  readonly hues: ChainHues
}

/** How it is shown at the moment. */
export interface PictureLook extends Omit<SceneInput, 'data' | 'geometry' | 'hues' | 'part'> {
  readonly marks?: MarkLayer | null
}

/** A rectangle to be painted, in CSS pixels, and how many device pixels each of them has. */
export interface PictureRequest {
  readonly view: View
  readonly width: number
  readonly height: number
  readonly ratio: number
  /**
   * `rest` leaves the chain in focus to a layer above; `whole` paints it too; `map` is the whole in thin strokes, by
   * occupancy and without marks, for a picture in which one line spacing is less than a pixel.
   */
  readonly kind: 'rest' | 'whole' | 'map'
}

/** Everything but the tags and the ruler, ready to be painted from any point of view. */
export interface Picture {
  of(source: PictureSource): void
  show(look: PictureLook): void
  /** Paints on a canvas of width · ratio by height · ratio pixels, in steps. */
  paint(ctx: Canvas2D, request: PictureRequest): Generator<void>
}

/** Width of a band in a map. */
const MAP_BAND_PIXELS = 1.1

function sceneInput(kind: PictureRequest['kind'], input: SceneInput): SceneInput {
  if (kind === 'rest') return { ...input, part: 'rest' }
  return kind === 'map' ? { ...input, lens: 'occupancy', hiddenKinds: new Set(['couplers']) } : input
}

export function createPicture(): Picture {
  let source: (PictureSource & { geometry: ChainGeometry; used: Uint8Array }) | null = null
  let look: PictureLook | null = null
  let ground: Ground | null = null
  const scenes = new Map<PictureRequest['kind'], LevelledScene>()
  const forget = () => {
    ground = null
    scenes.clear()
  }

  /** Works out what is to be painted, once for all points of view. */
  const prepare = (kind: PictureRequest['kind']) => {
    if (!source || !look) return null
    const input = { ...source, ...look }
    ground ??= { ...input, tails: tailsOf(input) }
    let scene = scenes.get(kind)
    if (!scene) {
      scene = levelScene(buildScene(sceneInput(kind, input)))
      scenes.set(kind, scene)
    }
    return { ground, scene, tokens: look.tokens }
  }

  return {
    of(next) {
      const geometry = chainGeometry(next.data, next.chains)
      source = { ...next, geometry, used: Uint8Array.from(geometry.roles.owner, (chain) => (chain < 0 ? 0 : 1)) }
      forget()
    },
    show(next) {
      look = next
      forget()
    },
    *paint(ctx, { view, width, height, ratio, kind }) {
      const prepared = prepare(kind)
      if (!prepared) return
      const { tokens, scene } = prepared
      yield
      ctx.setTransform(ratio, 0, 0, ratio, 0, 0)
      ctx.fillStyle = tokens.paper
      ctx.fillRect(0, 0, width, height)
      const size = { width, height }
      yield* kind === 'map'
        ? paintFabric(ctx, prepared.ground, view, size)
        : paintGround(ctx, prepared.ground, view, size)
      yield
      const sizes = sceneScale(prepared.ground.data, view, size)
      yield* paintScene(ctx, scene, view, kind === 'map' ? { ...sizes, bandPixels: MAP_BAND_PIXELS } : sizes, tokens)
    },
  }
}
