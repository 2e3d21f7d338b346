import { describe, expect, it } from 'vitest'
import { routesHolding } from '../../../../utils/team/routes'

const route = (method: string, path: string, summary: string) => ({ id: method + path, method, path, summary })
const groups = [
  { name: 'problems', routes: [route('GET', '/api/problems', 'Problems, newest first')] },
  {
    name: 'run-sheets',
    routes: [
      route('POST', '/api/run-sheets/{id}/submit', 'Submits for review'),
      route('GET', '/api/run-sheets', 'Run sheets'),
    ],
  },
]

describe('routesHolding', () => {
  it('keeps the routes in which every word occurs, wherever', () => {
    expect(routesHolding(groups, ' Review post ')).toEqual([{ name: 'run-sheets', routes: [groups[1]!.routes[0]] }])
    expect(routesHolding(groups, 'get').map(({ name }) => name)).toEqual(['problems', 'run-sheets'])
    expect(routesHolding(groups, 'get submit')).toEqual([])
  })

  it('keeps all where nothing is sought', () => {
    expect(routesHolding(groups, '  ')).toEqual(groups)
  })
})
