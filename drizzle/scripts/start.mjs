// @ts-check
// `npm start`: one command from a fresh clone to a running app. `npm run dev` is the same with --dev.
// Nothing newer than dynamic import stands here, so that an old Node comes as far as the sentence about its age.
import { nodeVersionProblem } from './node-version.mjs'

const problem = nodeVersionProblem(process.versions.node)
if (problem === null) {
  import('./start-app.mjs').then(module => module.startApp(process.argv.includes('--dev')))
}
else {
  console.error(problem)
  process.exitCode = 1
}
