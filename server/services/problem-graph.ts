import { convertForm } from '../../shared/engine/problem/convert'
import { DomainError } from '../../shared/errors'
import { packArrays } from '../../shared/packed-arrays'
import { isDrawnAsGraph, PROBLEM_GRAPH_LIMITS } from '../../shared/problem-graph'
import type { Actor, App } from '../app'
import { problemData, problemRow } from './problems'
import { signed, signOf } from './sense'

/**
 * What the problem graph is drawn from, by dense index: `rows` and `cols` of the interactions, and the coefficients of
 * both forms in the problem's own sense (`quboLinear`, `isingLinear`, `quboValues`, `isingValues`); the labels, the form
 * given and the fingerprint travel in the header.
 * @throws DomainError too large for a drawing
 */
export async function problemGraphOf(app: App, actor: Actor, id: string, version?: number): Promise<Uint8Array> {
  const row = await problemRow(app, actor, id, version)
  if (!isDrawnAsGraph(row)) {
    const { variables, interactions } = PROBLEM_GRAPH_LIMITS
    const message = `The graph is drawn up to ${variables} variables and ${interactions} interactions.`
    throw new DomainError('too large', 'graph.size', message)
  }
  const { form, labels, problem } = await problemData(app, row)
  const qubo = convertForm(problem, form, 'qubo')
  const ising = convertForm(problem, form, 'ising')
  const sign = signOf(row.sense)
  const inSense = (values: Float64Array) => values.map((value) => signed(sign, value))
  return packArrays(
    {
      rows: problem.rows,
      cols: problem.cols,
      quboLinear: inSense(qubo.linear),
      isingLinear: inSense(ising.linear),
      quboValues: inSense(qubo.values),
      isingValues: inSense(ising.values),
    },
    { labels, form: row.form, fingerprint: row.fingerprint },
  )
}
