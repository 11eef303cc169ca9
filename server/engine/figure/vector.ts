/** x forward, y up from the floor, z towards the viewer of a side view (the person's right). */
export interface Vec {
  x: number
  y: number
  z: number
}

export const vec = (x: number, y: number, z = 0): Vec => ({ x, y, z })
export const add = (a: Vec, b: Vec): Vec => ({ x: a.x + b.x, y: a.y + b.y, z: a.z + b.z })
export const subtract = (a: Vec, b: Vec): Vec => ({ x: a.x - b.x, y: a.y - b.y, z: a.z - b.z })
export const scale = (a: Vec, by: number): Vec => ({ x: a.x * by, y: a.y * by, z: a.z * by })
export const along = (from: Vec, direction: Vec, by: number): Vec => add(from, scale(direction, by))
export const dot = (a: Vec, b: Vec): number => a.x * b.x + a.y * b.y + a.z * b.z
export const lengthOf = (a: Vec): number => Math.sqrt(dot(a, a))
export const distance = (a: Vec, b: Vec): number => lengthOf(subtract(a, b))
export const cross = (a: Vec, b: Vec): Vec => ({
  x: a.y * b.z - a.z * b.y,
  y: a.z * b.x - a.x * b.z,
  z: a.x * b.y - a.y * b.x,
})
export const between = (a: Vec, b: Vec, part: number): Vec => along(a, subtract(b, a), part)
/** A direction of length 1; straight up for a vector without length. */
export function unit(a: Vec): Vec {
  const length = lengthOf(a)
  return length < 1e-9 ? vec(0, 1) : scale(a, 1 / length)
}

const RADIANS = Math.PI / 180
export const sine = (degrees: number): number => Math.sin(degrees * RADIANS)
export const cosine = (degrees: number): number => Math.cos(degrees * RADIANS)
export const degrees = (radians: number): number => radians / RADIANS
