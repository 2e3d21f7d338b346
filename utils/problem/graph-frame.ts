/**
 * Positions for drawing: the longer side of the picture reaches from −1 to 1, the middle is nought, y grows downwards.
 *
 * @param positions x and y of each variable
 */
export function framedPositions(positions: Float32Array): Float32Array {
  let [x1, y1, x2, y2] = [Infinity, Infinity, -Infinity, -Infinity]
  for (let at = 0; at < positions.length; at += 2) {
    x1 = Math.min(x1, positions[at]!)
    x2 = Math.max(x2, positions[at]!)
    y1 = Math.min(y1, positions[at + 1]!)
    y2 = Math.max(y2, positions[at + 1]!)
  }
  const half = Math.max(x2 - x1, y2 - y1) / 2 || 1
  return positions.map((place, k) => (place - (k % 2 ? y1 + y2 : x1 + x2) / 2) / half)
}

/** Box around some variables, or around all. */
export function boxOfVariables(framed: Float32Array, variables?: readonly number[]) {
  const box = { x1: Infinity, y1: Infinity, x2: -Infinity, y2: -Infinity }
  const note = (i: number) => {
    box.x1 = Math.min(box.x1, framed[2 * i]!)
    box.x2 = Math.max(box.x2, framed[2 * i]!)
    box.y1 = Math.min(box.y1, framed[2 * i + 1]!)
    box.y2 = Math.max(box.y2, framed[2 * i + 1]!)
  }
  if (variables) variables.forEach(note)
  else for (let i = 0; 2 * i < framed.length; i++) note(i)
  return box.x1 <= box.x2 ? box : { x1: -1, y1: -1, x2: 1, y2: 1 }
}
