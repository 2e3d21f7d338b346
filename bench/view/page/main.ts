/** The lattice view alone on a page, with one case of data; `window.bench` is what the measuring side talks to. */
import './globals'
import '../../../assets/css/main.css'
import { createPinia } from 'pinia'
import { createApp, h, shallowRef } from 'vue'
import type { Component } from 'vue'
import LatticeView from '../../../components/lattice/LatticeView.client.vue'
import { useSelectionStore } from '../../../stores/selection'
import { buildCase, CASES } from '../cases'
import type { BuiltCase } from '../cases'
import { startRecorder } from './recorder'

const shown = shallowRef<BuiltCase | null>(null)
const app = createApp({
  render: () => (shown.value ? h(LatticeView, { ...shown.value, aspect: 0.92, maxHeight: 760 }) : null),
})
app.use(createPinia())
// As Nuxt names them: by folder, which is not said twice.
const parts = import.meta.glob<{ default: Component }>('../../../components/lattice/*.vue', { eager: true })
for (const [path, part] of Object.entries(parts)) {
  const name = path.slice(path.lastIndexOf('/') + 1).replace(/(\.client)?\.vue$/, '')
  app.component(name.startsWith('Lattice') ? name : `Lattice${name}`, part.default)
}
app.mount('#app')

let built: BuiltCase | null = null
let start = 0

const nextFrame = () => new Promise(requestAnimationFrame)
async function until(selector: string): Promise<void> {
  while (!document.querySelector(selector)) await nextFrame()
}

const bench = {
  /** Makes the data, as it would arrive from the server. */
  prepare(name: string) {
    built = buildCase(CASES.find((candidate) => candidate.name === name)!)
    return { qubits: built.data.ids.length, couplers: built.data.ends.length / 2, chains: built.chains.labels.length }
  },
  /** Milliseconds from the data's arrival until the frame that shows the picture has been presented. */
  async firstPaint(): Promise<number> {
    start = performance.now()
    shown.value = built
    await until('[data-lattice-frame][aria-busy="false"]')
    await nextFrame()
    await nextFrame()
    return performance.now() - start
  },
  /** Milliseconds from the data's arrival until the camera is there. */
  async ready(): Promise<number> {
    await until('[data-lattice-frame] > div canvas')
    return performance.now() - start
  },
  record: startRecorder,
  selection: useSelectionStore(),
}

export type Bench = typeof bench
Object.assign(window, { bench })
