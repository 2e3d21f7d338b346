import type { ChainGeometry } from './geometry'
import type { PictureLook, PictureSource } from './picture'
import type { Box, OverlayLayer } from './types'

/** What stays the same for as long as the embedding does. */
export interface StageSource extends PictureSource {
  readonly geometry: ChainGeometry
  readonly bounds: Box
}

export interface StageLook extends PictureLook {
  readonly hovered: number | null
  readonly overlay: OverlayLayer | null
}
