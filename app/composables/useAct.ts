/**
 * One thing that a person does and that is written down: whether it is under way, and why it was not saved. A second press while
 * the first one is under way does nothing.
 */
export function useAct() {
  const busy = ref(false)
  const problem = ref('')
  const { notSaved } = useErrorText()

  /** @returns what the action gave, or undefined where it failed or another one is under way */
  async function run<T>(action: () => Promise<T>): Promise<T | undefined> {
    if (busy.value) return undefined
    busy.value = true
    problem.value = ''
    try {
      return await action()
    }
    catch (error) {
      console.error(error)
      const words = notSaved(error)
      problem.value = `${words.title}. ${words.message}`
      return undefined
    }
    finally {
      busy.value = false
    }
  }

  return { busy, problem, run }
}
