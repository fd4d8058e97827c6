import { mkdirSync, writeFileSync } from 'node:fs'
import { dirname } from 'node:path'
import type { Plugin } from 'vite'

/** Writes which modules went into which script of the browser, for `npm run bench -- field`. */
export function bundleReport(file: string): Plugin {
  return {
    name: 'lapel-bundle-report',
    apply: 'build',
    generateBundle(_options, bundle) {
      const chunks = Object.values(bundle).filter(item => item.type === 'chunk').map(chunk => ({
        fileName: chunk.fileName,
        name: chunk.name,
        imports: chunk.imports,
        modules: Object.entries(chunk.modules).map(([id, module]) => ({ id, bytes: module.renderedLength })).filter(module => module.bytes > 0),
      }))
      mkdirSync(dirname(file), { recursive: true })
      writeFileSync(file, JSON.stringify(chunks))
    },
  }
}
