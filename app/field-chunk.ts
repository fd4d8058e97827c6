/**
 * Puts every page and part of the field into one chunk, so that one visit brings all of it: a page that was never
 * opened before works with no network, and an update can never find half of an old build.
 *
 * @returns the chunk's name, or undefined where Rollup decides
 */
export function fieldChunk(id: string): string | undefined {
  if (id.includes('?')) id = id.slice(0, id.indexOf('?'))
  return /\/app\/(pages|components|layouts)\/field(\/|\.vue$)/.test(id) ? 'field' : undefined
}
