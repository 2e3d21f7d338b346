/** Where a formula comes from. Titles are from memory, as in docs/formulas.md. */
export interface Source {
  readonly author?: string
  readonly title: string
  readonly venue?: string
  readonly year?: number
}

export const DEFINITION: Source = { title: 'By definition' }
export const OWN: Source = { title: 'Espalier’s own: docs/formulas.md' }
export const MACHINE_SHEET: Source = { title: 'The machine sheet, as its steward entered it' }

export const CODATA: Source = {
  author: 'Tiesinga et al.',
  title: 'CODATA recommended values of the fundamental physical constants: 2018',
  venue: 'Rev. Mod. Phys. 93:025010',
  year: 2021,
}
export const WILSON: Source = {
  author: 'Wilson',
  title: 'Probable inference, the law of succession, and statistical inference',
  venue: 'J. Am. Stat. Assoc. 22:209',
  year: 1927,
}
export const MANTEL_HAENSZEL: Source = {
  author: 'Mantel & Haenszel',
  title: 'Statistical aspects of the analysis of data from retrospective studies of disease',
  year: 1959,
}
export const BENJAMINI_HOCHBERG: Source = {
  author: 'Benjamini & Hochberg',
  title: 'Controlling the false discovery rate',
  year: 1995,
}
export const CHOI_2008: Source = {
  author: 'Choi',
  title: 'Minor-embedding in adiabatic quantum computation: I. The parameter setting problem',
  venue: 'arXiv:0804.4884',
  year: 2008,
}
export const CHOI_2011: Source = {
  author: 'Choi',
  title: 'Minor-embedding in adiabatic quantum computation: II. Minor-universal graph design',
  venue: 'Quantum Inf. Process. 10',
  year: 2011,
}
export const VENTURELLI: Source = {
  author: 'Venturelli et al.',
  title: 'Quantum optimization of fully connected spin glasses',
  venue: 'Phys. Rev. X 5:031040',
  year: 2015,
}
export const KING_MCGEOCH: Source = {
  author: 'King & McGeoch',
  title: 'Algorithm engineering for a quantum annealing platform',
  venue: 'arXiv:1410.2628',
  year: 2014,
}
export const BOOTHBY_2016: Source = {
  author: 'Boothby, King & Roy',
  title: 'Fast clique minor generation in Chimera qubit connectivity graphs',
  venue: 'Quantum Inf. Process. 15',
  year: 2016,
}
export const PEGASUS: Source = {
  author: 'Boothby, Bunyk, Raymond & Roy',
  title: 'definition of the Pegasus graphs',
  venue: 'arXiv:2003.00133',
  year: 2020,
}
export const ZEPHYR: Source = { author: 'Boothby, King & Raymond', title: 'Zephyr topology', year: 2021 }
export const HEAVY_HEX: Source = {
  author: 'Chamberland, Zhu, Yoder, Hertzberg & Cross',
  title: 'Topological and subsystem codes on low-degree graphs with flag qubits',
  venue: 'Phys. Rev. X 10, 011022',
  year: 2020,
}
export const BODLAENDER_KOSTER: Source = {
  author: 'Bodlaender & Koster',
  title: 'Treewidth computations I. Upper bounds',
  venue: 'Inf. Comput. 208',
  year: 2010,
}
export const GILBERT: Source = {
  author: 'Gilbert, Ng & Peyton',
  title: 'An efficient algorithm to compute row and column counts for sparse Cholesky factorization',
  venue: 'SIAM J. Matrix Anal. Appl. 15',
  year: 1994,
}
export const CAI: Source = {
  author: 'Cai, Macready & Roy',
  title: 'A practical heuristic for finding graph minors',
  venue: 'arXiv:1406.2741',
  year: 2014,
}
export const GRAY: Source = {
  author: 'Gray',
  title: 'Pulse code communication',
  venue: 'US patent 2632058',
  year: 1953,
}
export const BERTELE_BRIOSCHI: Source = {
  author: 'Bertele & Brioschi',
  title: 'Nonserial dynamic programming',
  year: 1972,
}
export const GLOVER_WOOLSEY: Source = {
  author: 'Glover & Woolsey',
  title: 'Converting the 0-1 polynomial programming problem to a 0-1 linear program',
  venue: 'Oper. Res. 22',
  year: 1974,
}
export const KIRKPATRICK: Source = {
  author: 'Kirkpatrick, Gelatt & Vecchi',
  title: 'Optimization by simulated annealing',
  venue: 'Science 220',
  year: 1983,
}
export const LUCAS: Source = {
  author: 'Lucas',
  title: 'Ising formulations of many NP problems',
  venue: 'Front. Phys. 2:5',
  year: 2014,
}
export const GOGATE_DECHTER: Source = {
  author: 'Gogate & Dechter; Bodlaender, Koster & Wolle',
  title: 'A complete anytime algorithm for treewidth; Contraction and treewidth lower bounds',
  venue: 'UAI; ESA',
  year: 2004,
}
export const CUTHILL_MCKEE: Source = {
  author: 'Cuthill & McKee; George',
  title: 'Reducing the bandwidth of sparse symmetric matrices; Computer implementation of the finite element method',
  venue: 'ACM National Conference 1969; thesis, Stanford',
  year: 1971,
}
export const HAMMER_HANSEN_SIMEONE: Source = {
  author: 'Hammer, Hansen & Simeone',
  title: 'Roof duality, complementation and persistency in quadratic 0–1 optimization',
  venue: 'Math. Programming 28',
  year: 1984,
}
export const BOROS_HAMMER: Source = {
  author: 'Boros & Hammer',
  title: 'Pseudo-Boolean optimization',
  venue: 'Discrete Appl. Math. 123',
  year: 2002,
}
export const ISAKOV: Source = {
  author: 'Isakov, Zintchenko, Rønnow & Troyer',
  title: 'Optimised simulated annealing for Ising spin glasses',
  venue: 'Comput. Phys. Commun. 192',
  year: 2015,
}
export const MARTONAK: Source = {
  author: 'Martoňák, Santoro & Tosatti',
  title: 'Quantum annealing by the path-integral Monte Carlo method: the two-dimensional random Ising model',
  venue: 'Phys. Rev. B 66:094203',
  year: 2002,
}
export const RONNOW: Source = {
  author: 'Rønnow et al.',
  title: 'Defining and detecting quantum speedup',
  venue: 'Science 345:420',
  year: 2014,
}
export const BESAG: Source = {
  author: 'Besag',
  title: 'Statistical analysis of non-lattice data',
  venue: 'The Statistician 24:179',
  year: 1975,
}
export const PEARSON: Source = {
  author: 'Pearson',
  title:
    'On the criterion that a given system of deviations … can be reasonably supposed to have arisen from random sampling',
  venue: 'Phil. Mag. 50:157',
  year: 1900,
}
export const KRUSKAL_WALLIS: Source = {
  author: 'Kruskal & Wallis',
  title: 'Use of ranks in one-criterion variance analysis',
  venue: 'J. Am. Stat. Assoc. 47:583',
  year: 1952,
}
