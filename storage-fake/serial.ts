/** Runs the tasks of one name one after another, those of different names side by side. */
export class Serial {
  private readonly tails = new Map<string, Promise<unknown>>()

  async run<T>(name: string, task: () => Promise<T>): Promise<T> {
    const before = this.tails.get(name) ?? Promise.resolve()
    const mine = before.then(task, task)
    const tail = mine.catch(() => undefined)
    this.tails.set(name, tail)
    try {
      return await mine
    } finally {
      if (this.tails.get(name) === tail) this.tails.delete(name)
    }
  }
}
