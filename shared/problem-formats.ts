/** The formats that problems are read in, as the pages tell of them; the engine's readers are in `engine/formats`. */
export interface ProblemFormatInfo {
  readonly title: string
  /** In the middle of a sentence. */
  readonly name: string
  readonly endings: readonly string[]
  /** What it holds and how it is understood. */
  readonly about: string
  /** Two lines of a file, or of the code that writes one. */
  readonly example: string
}

export const PROBLEM_FORMATS = {
  coefficients: {
    title: 'Coefficient list',
    name: 'coefficient list',
    endings: ['csv', 'tsv', 'txt'],
    about:
      'One entry a line: two labels and a value, separated by spaces, tabs, commas or semicolons. Entries of one pair are summed, whichever way round they stand; a line of column names at the top is passed over.',
    example: 'pier pier -1.5\npier quay 2',
  },
  'dense-csv': {
    title: 'Dense matrix (CSV)',
    name: 'dense matrix',
    endings: ['csv', 'tsv', 'txt'],
    about:
      'Square, with or without labels. The two cells of a pair are added up, so that an upper, a lower and a symmetric matrix are read by one rule.',
    example: '-1.5,2\n0,3',
  },
  'matrix-market': {
    title: 'Matrix Market',
    name: 'Matrix Market file',
    endings: ['mtx'],
    about:
      'Coordinate or array, general or symmetric, real or integer values, read as a matrix. A symmetric file holds one triangle for both: an entry off its diagonal counts twice.',
    example: '%%MatrixMarket matrix coordinate real general\n2 2 1',
  },
  'max-cut': {
    title: 'Max-cut edge list',
    name: 'max-cut edge list',
    endings: ['txt', 'mc'],
    about:
      'Numbers of vertices and edges, then an edge a line with its weight, or none for weight 1. The cut is maximised, and the value shown is its weight.',
    example: '3 2\n1 2 5',
  },
  npy: {
    title: 'NumPy array (.npy)',
    name: 'NumPy array',
    endings: ['npy'],
    about: 'A square array of floats, integers or booleans, read as a matrix.',
    example: 'q = np.array([[-1.5, 2], [0, 3]])\nnp.save("problem.npy", q)',
  },
  npz: {
    title: 'SciPy sparse matrix (.npz)',
    name: 'SciPy sparse matrix',
    endings: ['npz'],
    about: 'A square matrix in csr, csc or coo layout as scipy.sparse.save_npz writes it.',
    example: 'q = scipy.sparse.coo_array((v, (i, j)))\nscipy.sparse.save_npz("problem.npz", q)',
  },
  json: {
    title: 'JSON document',
    name: 'JSON document',
    endings: ['json'],
    about: 'Form, sense, offset, variables and coefficients by name; its JSON Schema is at /api/schemas/problem.json.',
    example: '{"kind": "espalier.problem", "version": 1,\n "form": "qubo", "interactions": [["pier", "quay", 2]]}',
  },
} as const satisfies Record<string, ProblemFormatInfo>

export type ProblemFormatId = keyof typeof PROBLEM_FORMATS

export const PROBLEM_FORMAT_IDS = Object.keys(PROBLEM_FORMATS) as [ProblemFormatId, ...ProblemFormatId[]]

/** Files as they are sent, and what may come of them once they are unpacked. */
export const PROBLEM_FILE_LIMITS = { sentBytes: 64 * 2 ** 20, unpackedBytes: 512 * 2 ** 20 }
