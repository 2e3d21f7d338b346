import { computed } from 'vue'
import type { ComputedRef } from 'vue'
import type { ChainHues } from '~/utils/hues'
import { padBox } from './framing'
import { chainGeometry } from './geometry'
import type { ChainGeometry } from './geometry'
import { indexSegments, nearestSegment } from './hit-test'
import { huesOfChains } from './hue-conflicts'
import { NO_CHAINS } from './no-chains'
import { boxOfSegments } from './segments'
import type { StageSource } from './stage-types'
import type { Box, ChainLayer, LatticeData, View } from './types'

const NOWHERE: Box = { x1: 0, y1: 0, x2: 1, y2: 1 }

export interface ChainView {
  readonly chains: ComputedRef<ChainLayer>
  readonly geometry: ComputedRef<ChainGeometry>
  readonly source: ComputedRef<StageSource>
  /** The smallest box around all qubits; the bounds of the source have some room around it. */
  readonly machine: ComputedRef<Box>
  /** Chain that holds the qubit, or −1. */
  ownerOf(qubit: number): number
  /** Qubit at a pixel of the viewport, or −1; those of chains are easier to hit than free ones. */
  qubitAt(view: View, x: number, y: number): number
  /** Works out what hits need, so that the first move of the pointer does not wait for it. */
  prepareHits(): void
  /** Box around the bands of the chains meant, all of them unless told otherwise; null where there are none. */
  boxOfChains(isMeant?: (chain: number) => boolean): Box | null
  boxOfQubits(qubits: readonly number[]): Box | null
}

export interface ChainViewProps {
  readonly data: LatticeData
  readonly chains: ChainLayer | null
  readonly hues: ChainHues | null
}

/** Pixels around the pointer within which a qubit is hit, and the most of it in line spacings. */
const REACH = { pixels: 7, lines: 1.4 }

/** All that follows from machine and chains alone, worked out once for as long as they stay. */
export function useChainView(props: ChainViewProps): ChainView {
  const chains = computed(() => props.chains ?? NO_CHAINS)
  const geometry = computed(() => chainGeometry(props.data, chains.value))
  const machine = computed(() => boxOfSegments(props.data.segments) ?? NOWHERE)
  const source = computed<StageSource>(() => ({
    data: props.data,
    chains: chains.value,
    hues: props.hues ?? huesOfChains(props.data, chains.value),
    geometry: geometry.value,
    bounds: padBox(machine.value, 1.5),
  }))
  const index = computed(() => indexSegments(props.data.segments))
  const ownerOf = (qubit: number): number => geometry.value.roles.owner[qubit] ?? -1

  return {
    chains,
    geometry,
    source,
    machine,
    ownerOf,
    qubitAt({ scale, x: originX, y: originY }, x, y) {
      const reach = Math.min(REACH.lines, REACH.pixels / scale)
      const bonus = (qubit: number) => (ownerOf(qubit) < 0 ? 0 : 0.12)
      return nearestSegment(index.value, (x - originX) / scale, (y - originY) / scale, reach, bonus)
    },
    prepareHits: () => void index.value,
    boxOfChains(isMeant = () => true) {
      const meant = geometry.value.bands.filter((band) => isMeant(band.chain))
      const box = boxOfSegments(Float32Array.from(meant.flatMap(({ x1, y1, x2, y2 }) => [x1, y1, x2, y2])))
      return box && padBox(box, 2.5)
    },
    boxOfQubits(qubits) {
      const box = boxOfSegments(props.data.segments, qubits)
      return box && padBox(box, 3)
    },
  }
}
