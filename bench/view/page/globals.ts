/** What Nuxt would import into components by itself. */
import * as vue from 'vue'
import { useSelectionStore } from '../../../stores/selection'

Object.assign(globalThis, vue, { useSelectionStore })
