import type { EmbeddingView } from '#shared/schemas/embeddings'
import type { LatticeArrays } from './useMachines'
import type { ChainFindings, EmbeddingChains } from '~/utils/embedding/layers'
import { breakLayer, loadLayer } from '~/utils/embedding/layers'
import { brokenChains, readLayer } from '~/utils/embedding/reads'

interface LensSubject {
  readonly embedding: EmbeddingView
  readonly lattice: LatticeArrays
  readonly chains: EmbeddingChains
}

/**
 * What the lenses of an embedding show: programmed load, breaks, one read, and the words beside them.
 *
 * @param findings what a run sheet says of the chains that are shown
 */
export function useChainLenses(subject: LensSubject, findings: () => ChainFindings | null) {
  const selection = useSelectionStore()
  const breaks = computed(() => {
    const samples = findings()?.samples
    return samples ? breakLayer(subject.lattice, samples) : null
  })
  const load = computed(() => {
    const programmed = findings()?.programmed
    return programmed ? loadLayer(subject.lattice, programmed, subject.chains.ranges) : null
  })
  const unavailable = computed(() => {
    const sheet = findings()?.runSheet
    if (!sheet) return { load: 'Load needs a run sheet.', breaks: 'Breaks need samples.' }
    const noSums = `No load: ${subject.embedding.machine.name} bounds no coupling sum.`
    return {
      load: findings()?.programmed ? noSums : `RS-${sheet.number} cannot be programmed as it stands.`,
      breaks: `Breaks need samples of RS-${sheet.number}.`,
    }
  })
  const isRehearsal = computed(() => findings()?.samples?.source === 'rehearsal')
  const remark = computed(() => {
    const sheet = findings()?.runSheet
    if (!sheet) return ''
    if (selection.lens === 'load' && load.value) return `Values of RS-${sheet.number}`
    if (!breaks.value) return ''
    return `${isRehearsal.value ? 'Rehearsal' : 'Return'} of RS-${sheet.number}`
  })

  const reads = useReadRows(findings, () => subject.lattice)
  const canStep = computed(() => selection.lens === 'breaks' && !!breaks.value && !!findings()?.programmed)
  const read = computed(() =>
    canStep.value && reads.rows.value && reads.row.value !== null
      ? readLayer(reads.rows.value, reads.row.value, subject.lattice)
      : null,
  )
  /** Labels of the chains that broke in the read shown. */
  const broken = computed(() =>
    read.value ? brokenChains(subject.chains, read.value).map((i) => subject.chains.labels[i]!) : [],
  )
  return { breaks, load, unavailable, isRehearsal, remark, reads, canStep, read, broken }
}
