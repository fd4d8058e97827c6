import { isStorable } from './storable'

/** Limits of a JSON value that comes from outside: nesting, and characters in one text. */
export const MAX_DEPTH = 12
export const MAX_TEXT = 10_000

/** `isStorable`: PostgreSQL can keep every text in it as it is. */
export interface JsonShape { depth: number, longestText: number, isStorable: boolean }

/** Measures a parsed JSON value without recursion, so that no nesting can exhaust the stack. The outermost value has depth 0. */
export function shapeOf(value: unknown): JsonShape {
  const shape: JsonShape = { depth: 0, longestText: 0, isStorable: true }
  const measure = (text: string) => {
    if (text.length > shape.longestText) shape.longestText = text.length
    if (shape.isStorable && !isStorable(text)) shape.isStorable = false
  }
  const waiting: [unknown, number][] = [[value, 0]]
  for (let next = waiting.pop(); next; next = waiting.pop()) {
    const [item, depth] = next
    if (depth > shape.depth) shape.depth = depth
    if (typeof item === 'string') measure(item)
    else if (Array.isArray(item)) for (const child of item) waiting.push([child, depth + 1])
    else if (item !== null && typeof item === 'object') {
      for (const [key, child] of Object.entries(item)) {
        measure(key)
        waiting.push([child, depth + 1])
      }
    }
  }
  return shape
}
