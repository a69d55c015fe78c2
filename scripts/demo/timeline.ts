/** What happens in the invented past, each act at its instant; played in order, so that the trail reads like a history. */
export class Timeline {
  readonly #acts: { at: string; act: (at: string) => Promise<unknown> }[] = [];

  add(at: string, act: (at: string) => Promise<unknown>): void {
    this.#acts.push({ at, act });
  }

  /** Plays what lies in the past of `now`; the rest has not happened yet. */
  async play(now: string): Promise<number> {
    const past = this.#acts.filter(({ at }) => at <= now).sort((a, b) => (a.at < b.at ? -1 : a.at > b.at ? 1 : 0));
    for (const { at, act } of past) await act(at);
    return past.length;
  }
}
