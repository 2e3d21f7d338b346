/** The files that a problem can be taken as. The pages and the server read the same table. */
export const PROBLEM_FILES = {
  csv: { format: 'coefficients', ending: 'csv', title: 'Coefficient list (.csv)', holds: 'Any problem.' },
  dense: {
    format: 'dense-csv',
    ending: 'csv',
    title: 'Dense matrix (.csv)',
    holds: 'Any problem of at most 5,000 variables.',
  },
  mtx: { format: 'matrix-market', ending: 'mtx', title: 'Matrix Market (.mtx)', holds: 'Any problem.' },
  json: { format: 'json', ending: 'json', title: 'JSON document (.json)', holds: 'Any problem.' },
  npz: {
    format: 'npz',
    ending: 'npz',
    title: 'SciPy sparse matrix (.npz)',
    holds: 'Any problem; SciPy reads the matrix, NumPy the rest.',
  },
  npy: {
    format: 'npy',
    ending: 'npy',
    title: 'NumPy array (.npy)',
    holds: 'A bare matrix: only a QUBO to be minimised, with offset 0 and variables 0 … n − 1, at most 5,000.',
  },
  cut: {
    format: 'max-cut',
    ending: 'txt',
    title: 'Max-cut edge list (.txt)',
    holds: 'Only the weight of a cut, to be maximised.',
  },
} as const

export type ProblemFileKey = keyof typeof PROBLEM_FILES

export const PROBLEM_FILE_KEYS = Object.keys(PROBLEM_FILES) as [ProblemFileKey, ...ProblemFileKey[]]
