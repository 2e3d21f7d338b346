import { computed } from 'vue'
import type { ComputedRef, ShallowRef } from 'vue'
import type { useSelectionStore } from '~/stores/selection'
import { chainClasses, chainsOfClasses } from './kinds'
import type { ChainClass } from './kinds'
import type { StageLook } from './stage-types'
import { calmed } from './tokens'
import type { Tokens } from './tokens'
import type {
  BreakLayer,
  ChainLayer,
  HeatLayer,
  LatticeData,
  Lens,
  LoadLayer,
  MarkLayer,
  OverlayLayer,
  ReadLayer,
} from './types'
import type { ChainView } from './use-chain-view'

export interface LookProps {
  readonly data: LatticeData
  readonly chains: ChainLayer | null
  readonly breaks: BreakLayer | null
  readonly load: LoadLayer | null
  readonly read: ReadLayer | null
  readonly heat: HeatLayer | null
  readonly marks: MarkLayer | null
  readonly overlay: OverlayLayer | null
}

export interface LatticeLook {
  /** Chain in focus, when it is one of those shown. */
  readonly focused: ComputedRef<number | null>
  /** Lens asked for, or occupancy where its data are not there. */
  readonly lens: ComputedRef<Lens>
  readonly classes: ComputedRef<ChainClass[]>
  readonly look: ComputedRef<StageLook>
  readonly missing: ComputedRef<number>
  /** The drawing in words. */
  readonly summary: ComputedRef<string>
}

/** What the drawing shows at the moment, from its layers and the shared selection. */
export function useLatticeLook(
  props: LookProps,
  view: ChainView,
  selection: ReturnType<typeof useSelectionStore>,
  tokens: Readonly<ShallowRef<Tokens>>,
): LatticeLook {
  const focused = computed(() =>
    selection.focused !== null && selection.focused < view.chains.value.labels.length ? selection.focused : null,
  )
  const lens = computed<Lens>(() => {
    if (selection.lens === 'load' && !props.load) return 'occupancy'
    if (selection.lens === 'breaks' && !props.breaks && !props.read) return 'occupancy'
    return selection.lens
  })
  const classes = computed(() =>
    chainClasses({ lens: lens.value, chains: view.chains.value, breaks: props.breaks, load: props.load }),
  )
  const muted = computed(() => chainsOfClasses(classes.value, selection.hiddenClasses))
  const calm = computed(() => calmed(tokens.value))
  const look = computed<StageLook>(() => ({
    tokens: calm.value,
    lens: lens.value,
    focused: focused.value,
    selected: selection.selected,
    muted: muted.value,
    hiddenKinds: selection.hiddenKinds,
    breaks: props.breaks,
    load: props.load,
    read: props.read,
    heat: props.heat,
    marks: props.marks,
    overlay: props.overlay,
    hovered: selection.hovered,
  }))
  const missing = computed(() => props.data.usable.reduce((sum, works) => sum + (works ? 0 : 1), 0))
  const summary = computed(() => {
    const machine = `Lattice of ${props.data.ids.length - missing.value} qubits, ${missing.value} missing`
    if (!props.chains) return `${machine}.`
    const { labels, qubits } = props.chains
    const focus = focused.value === null ? 'no chain in focus' : `chain ${labels[focused.value]} in focus`
    return `${machine}. ${labels.length} chains on ${qubits.length} qubits, ${lens.value} shown, ${focus}.`
  })
  return { focused, lens, classes, look, missing, summary }
}

/** A qubit in words, as the pointer finds it. */
export function qubitInWords(
  { data, load }: Pick<LookProps, 'data' | 'load'>,
  { ownerOf, chains }: ChainView,
  lens: Lens,
  qubit: number,
): string {
  const number = `qubit ${data.ids[qubit]}`
  if (!data.usable[qubit]) return `${number}, missing`
  const chain = ownerOf(qubit)
  if (chain < 0) return `${number}, free`
  const share = lens === 'load' ? `, ${Math.round(100 * (load?.qubitLoad[qubit] ?? 0))} % of range` : ''
  return `${chains.value.labels[chain]}, ${number}${share}`
}
