/** Patches waiting to be merged: the smallest first, of equal ones the one met first on the map. A binary heap. */
export class PatchQueue {
  readonly #patch: number[] = [];
  readonly #area: number[] = [];

  push(patch: number, areaM2: number): void {
    let at = this.#patch.push(patch) - 1;
    this.#area.push(areaM2);
    while (at > 0) {
      const above = (at - 1) >> 1;
      if (!this.#isBefore(at, above)) return;
      this.#swap(at, above);
      at = above;
    }
  }

  pop(): { patch: number; areaM2: number } | null {
    if (this.#patch.length === 0) return null;
    this.#swap(0, this.#patch.length - 1);
    const patch = this.#patch.pop() as number;
    const areaM2 = this.#area.pop() as number;
    for (let at = 0; ;) {
      let least = at;
      for (const below of [2 * at + 1, 2 * at + 2]) {
        if (below < this.#patch.length && this.#isBefore(below, least)) least = below;
      }
      if (least === at) return { patch, areaM2 };
      this.#swap(at, least);
      at = least;
    }
  }

  #isBefore(a: number, b: number): boolean {
    return this.#area[a] < this.#area[b] || (this.#area[a] === this.#area[b] && this.#patch[a] < this.#patch[b]);
  }

  #swap(a: number, b: number): void {
    [this.#patch[a], this.#patch[b]] = [this.#patch[b], this.#patch[a]];
    [this.#area[a], this.#area[b]] = [this.#area[b], this.#area[a]];
  }
}
