import type { ChainHues } from '~/utils/hues'
import { chainGeometry } from './geometry'
import type { ChainGeometry } from './geometry'
import type { Ground } from './ground'
import type { Canvas2D } from './paint-edges'
import { paintGround } from './paint-ground'
import { levelScene, paintScene } from './paint-scene'
import type { LevelledScene } from './paint-scene'
import { buildScene, isOfPoints } from './scene'
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
  /** Paints the chain in focus too, which is else left to a layer above. */
  readonly whole: boolean
}

/** Everything but the tags and the ruler, ready to be painted from any point of view. */
export interface Picture {
  of(source: PictureSource): void
  show(look: PictureLook): void
  /** Paints on a canvas of width · ratio by height · ratio pixels, in steps. */
  paint(ctx: Canvas2D, request: PictureRequest): Generator<void>
}

export function createPicture(): Picture {
  let source: (PictureSource & { geometry: ChainGeometry; used: Uint8Array }) | null = null
  let look: PictureLook | null = null
  let ground: Ground | null = null
  const scenes = new Map<boolean, LevelledScene>()
  const forget = () => {
    ground = null
    scenes.clear()
  }

  /** Works out what is to be painted, once for all points of view. */
  const prepare = (whole: boolean) => {
    if (!source || !look) return null
    const input = { ...source, ...look }
    ground ??= { ...input, tails: tailsOf(input) }
    let scene = scenes.get(whole)
    if (!scene) {
      scene = levelScene(buildScene(whole ? input : { ...input, part: 'rest' }))
      scenes.set(whole, scene)
    }
    return { ground, scene, tokens: look.tokens, areMarksApart: isOfPoints(source.data) }
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
    *paint(ctx, { view, width, height, ratio, whole }) {
      const prepared = prepare(whole)
      if (!prepared) return
      const { tokens, scene, areMarksApart } = prepared
      yield
      ctx.setTransform(ratio, 0, 0, ratio, 0, 0)
      ctx.fillStyle = tokens.paper
      ctx.fillRect(0, 0, width, height)
      yield* paintGround(ctx, prepared.ground, view, { width, height })
      yield
      yield* paintScene(ctx, scene, view, { width, height }, areMarksApart ? 0.46 * view.scale : Infinity, tokens)
    },
  }
}
