/**
 * Lets few do something heavy at once and the others wait their turn, so that many uploads at one moment do not take
 * the memory of the server.
 */
export function turns(atOnce: number): <T>(work: () => Promise<T>) => Promise<T> {
  let running = 0
  const waiting: (() => void)[] = []
  return async (work) => {
    if (running >= atOnce) await new Promise<void>(resolve => waiting.push(resolve))
    else running++
    try {
      return await work()
    }
    finally {
      const next = waiting.shift()
      if (next) next()
      else running--
    }
  }
}
