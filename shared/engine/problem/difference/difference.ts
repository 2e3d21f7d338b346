<script setup lang="ts">
import { computed, inject, ref, useId } from 'vue'
import UiKeyHint from './KeyHint.vue'
import { fieldKey } from '../../utils/ui/parts'

/** One answer to what was typed. */
export interface ComboboxOption {
  readonly key: string
  readonly label: string
  readonly note?: string
}

const props = withDefaults(
  defineProps<{
    /** Above the box, or before it; within a field the field's label stands there. */
    label: string
    /** Answers to the question, best first. */
    options: readonly ComboboxOption[]
    /** Said when there is no answer. */
    none: string
    /** What is chosen, where the box keeps a choice. */
    chosen?: { key: string; label: string } | null
    /** Key on the keyboard that leads here, shown in the box. */
    shortcut?: string
    /** The label stands before the box and not above it. */
    inline?: boolean
    /** The box is part of a form: what is typed or chosen stays in it. */
    keepsWords?: boolean
  }>(),
  { chosen: null, shortcut: undefined },
)
const emit = defineEmits<{ choose: [key: string] }>()
const words = defineModel<string>('words', { required: true })

const ownId = useId()
const field = inject(fieldKey, undefined)
const id = field?.id ?? ownId
const input = ref<HTMLInputElement>()
const isOpen = ref(false)
/** Answer that Enter takes. */
const at = ref(0)

const isAsking = computed(() => isOpen.value && words.value.trim() !== '')
const hasAnswers = computed(() => isAsking.value && props.options.length > 0)
const current = computed(() => Math.min(at.value, props.options.length - 1))
const shown = computed(() => words.value || props.chosen?.label || '')
const optionId = (k: number) => `${id}-${k}`

function ask(event: Event) {
  words.value = (event.target as HTMLInputElement).value
  isOpen.value = true
  at.value = 0
}

function choose(option: ComboboxOption | undefined) {
  if (!option) return
  emit('choose', option.key)
  close()
  words.value = props.keepsWords ? option.label : ''
}

function close() {
  isOpen.value = false
}

/** A choice that stands is shown again when the box is left. */
function leave() {
  close()
  if (props.chosen) words.value = ''
}

function move(by: number) {
  isOpen.value = true
  const count = props.options.length
  if (count > 0) at.value = (current.value + by + count) % count
}

const KEYS: Record<string, () => void> = {
  ArrowDown: () => move(1),
  ArrowUp: () => move(-1),
  Enter: () => choose(props.options[current.value]),
  Escape: close,
}

function onKeydown(event: KeyboardEvent) {
  if (event.isComposing || !(event.key in KEYS) || !isAsking.value) return
  KEYS[event.key]!()
  event.preventDefault()
}

function focus() {
  input.value?.focus()
  input.value?.select()
}
defineExpose({ focus })
</script>

<template>
  <div class="combobox" :class="{ inline }">
    <label v-if="!field" :for="id">{{ label }}</label>
    <div class="box" :class="{ invalid: field?.invalid.value }">
      <input
        :id="id"
        ref="input"
        class="font-mono"
        type="text"
        role="combobox"
        autocomplete="off"
        spellcheck="false"
        aria-autocomplete="list"
        aria-haspopup="listbox"
        :aria-expanded="hasAnswers"
        :aria-controls="hasAnswers ? `${id}-list` : undefined"
        :aria-activedescendant="hasAnswers ? optionId(current) : undefined"
        :aria-keyshortcuts="shortcut"
        :aria-invalid="field?.invalid.value || undefined"
        :aria-describedby="field?.describedBy.value"
        :required="field?.required.value || undefined"
        :value="shown"
        @input="ask"
        @keydown="onKeydown"
        @focus="input?.select()"
        @click="isOpen = true"
        @blur="leave"
      />
      <span v-if="shortcut && !shown" class="pr-2" aria-hidden="true"><UiKeyHint :keys="[shortcut]" /></span>
      <!-- The focus stays in the field while the pointer chooses. -->
      <div v-if="isAsking" class="answers" @pointerdown.prevent>
        <ul v-if="options.length" :id="`${id}-list`" role="listbox" :aria-label="label">
          <li
            v-for="(option, k) in options"
            :id="optionId(k)"
            :key="option.key"
            role="option"
            :aria-selected="k === current"
            @click="choose(option)"
            @pointermove="at = k"
          >
            <span class="font-mono">{{ option.label }}</span>
            <span v-if="option.note" class="note">{{ option.note }}</span>
          </li>
        </ul>
        <p v-else class="none" role="status">{{ none }}</p>
      </div>
    </div>
  </div>
</template>

<style scoped>
.combobox {
  display: grid;
  grid-template-columns: minmax(0, 1fr);
  gap: 0.25rem;
  min-width: 0;
  font-size: 0.8125rem;
  line-height: 1.125rem;
}

.inline {
  grid-template-columns: auto minmax(0, 1fr);
  align-items: center;
  gap: 0.75rem;
}

.box {
  position: relative;
  display: flex;
  align-items: center;
  min-height: 2.125rem;
  border: 1px solid var(--rule);
  border-bottom: 2px solid var(--edge);
  border-radius: 2px;
  background: var(--field);
  color: var(--ink);
}

.box:hover {
  border-bottom-color: var(--ink);
}

.box:focus-within {
  outline: 2px solid var(--leaf);
  outline-offset: 2px;
}

.invalid {
  border-color: var(--clay);
}

input {
  flex: 1 1 auto;
  align-self: stretch;
  width: 100%;
  min-width: 0;
  border: 0;
  background: none;
  padding: 0.25rem 0.625rem;
  color: inherit;
  font-size: 0.875rem;
  outline: none;
}

.answers {
  position: absolute;
  z-index: 30;
  top: calc(100% + 6px);
  left: -1px;
  width: max(100% + 2px, 15rem);
  max-width: calc(100vw - 2rem);
  border: 1px solid var(--ink);
  background: var(--paper);
  padding: 0.25rem 0;
}

li {
  display: flex;
  align-items: baseline;
  gap: 0.5rem;
  min-height: 1.875rem;
  padding: 0.375rem 0.75rem;
  cursor: pointer;
}

li[aria-selected='true'] {
  background: var(--well);
  outline: 2px solid var(--leaf);
  outline-offset: -2px;
}

.note {
  margin-left: auto;
  padding-left: 1rem;
  color: var(--ink2);
  text-align: right;
}

.none {
  padding: 0.375rem 0.75rem;
  color: var(--ink2);
}

@media screen and (max-width: 719.98px), (pointer: coarse) {
  .box,
  li {
    min-height: 2.75rem;
  }

  li {
    align-items: center;
  }

  input {
    font-size: 1rem;
  }
}
</style>
