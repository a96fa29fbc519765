/** Does one thing after the other, and of those that wait the latest alone. */
export class LatestOnly {
  #running: Promise<unknown> = Promise.resolve();
  #latest = 0;

  /** Resolves to what the work makes; to undefined, whatever it does, once a later one was asked for. */
  run<Made>(work: () => Promise<Made>): Promise<Made | undefined> {
    const number = ++this.#latest;
    const done = this.#running.then(async () => {
      if (number !== this.#latest) return undefined;
      try {
        const made = await work();
        return number === this.#latest ? made : undefined;
      } catch (error) {
        if (number === this.#latest) throw error;
        return undefined;
      }
    });
    this.#running = done.catch(() => {});
    return done;
  }

  /** What was asked for is not wanted any more. */
  leave(): void {
    this.#latest++;
  }
}
