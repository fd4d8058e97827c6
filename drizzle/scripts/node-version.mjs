// @ts-check
// Written so that an old Node can read it too: it must get far enough to say that it is too old.

/**
 * @param {string} version as in process.versions.node
 * @returns {string | null} a sentence for the person, or null when this Node will do
 */
export function nodeVersionProblem(version) {
  const parts = version.split('.').map(Number)
  const major = parts[0] || 0
  const minor = parts[1] || 0
  const isGood = (major === 20 && minor >= 19) || (major === 22 && minor >= 12) || major > 22
  return isGood ? null : 'Lapel needs Node 20.19 or newer in version 20, or Node 22.12 or newer. This is Node ' + version + '.'
}
