import { duplicateProblemSchema } from '../../../../shared/schemas/problem-versions'
import { duplicateProblem } from '../../../services/problem-copies'

/** Copies a version of a problem, `{version?, name?}`, with note, tags and groups, as one of its own: 201 `{id, number}`. */
export default defineRoute(['developer', 'owner'], async (event, { app, ...actor }) => {
  const result = await duplicateProblem(app, actor, partOf(event, 'id'), await bodyOf(event, duplicateProblemSchema))
  setResponseStatus(event, 201)
  return result
})
