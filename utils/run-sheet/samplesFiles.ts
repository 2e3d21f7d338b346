import type { Choice } from '../ui/parts'

export const SAMPLES_FORMAT_CHOICES: Choice[] = [
  { value: 'csv', label: 'Table', note: 'commas, semicolons, tabs or blanks' },
  { value: 'npy', label: 'NumPy array', note: '.npy' },
  { value: 'npz', label: 'NumPy archive', note: '.npz' },
  { value: 'json', label: 'JSON document' },
]

export const GAUGE_CHOICES: Choice[] = [
  { value: 'undone', label: 'undone already' },
  { value: 'as read', label: 'as read', note: 'undo them here' },
]
