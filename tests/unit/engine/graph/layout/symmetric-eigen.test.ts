import { describe, expect, it } from 'vitest'
import { symmetricEigen } from '../../../../../shared/engine/graph/layout/symmetric-eigen'
import { createRandom } from '../../../../../shared/engine/random'

describe('symmetricEigen', () => {
  it.each([1, 2, 5, 24])('gives orthonormal vectors that a random matrix of size %i only stretches', (size) => {
    const random = createRandom(size)
    const matrix = new Float64Array(size * size)
    for (let i = 0; i < size; i++)
      for (let j = i; j < size; j++) matrix[i * size + j] = matrix[j * size + i] = random.normal()
    const { values, vectors } = symmetricEigen(matrix, size)
    for (let k = 0; k < size; k++) {
      if (k > 0) expect(values[k]).toBeLessThanOrEqual(values[k - 1]!)
      for (let i = 0; i < size; i++) {
        let [image, overlap] = [0, 0]
        for (let j = 0; j < size; j++) {
          image += matrix[i * size + j]! * vectors[j * size + k]!
          overlap += vectors[j * size + i]! * vectors[j * size + k]!
        }
        expect(image).toBeCloseTo(values[k]! * vectors[i * size + k]!, 9)
        expect(overlap).toBeCloseTo(i === k ? 1 : 0, 9)
      }
    }
  })

  it('takes a matrix of zeros', () => {
    expect([...symmetricEigen(new Float64Array(9), 3).values]).toEqual([0, 0, 0])
  })
})
