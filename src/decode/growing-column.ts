const CHUNK = 65_536;

/** A column of numbers that grows in chunks, so that no array is copied while it does. */
export class GrowingColumn {
  private readonly full: Float64Array[] = [];
  private chunk = new Float64Array(CHUNK);
  private used = 0;

  push(value: number): void {
    if (this.used === CHUNK) {
      this.full.push(this.chunk);
      this.chunk = new Float64Array(CHUNK);
      this.used = 0;
    }
    this.chunk[this.used] = value;
    this.used += 1;
  }

  get length(): number {
    return this.full.length * CHUNK + this.used;
  }

  /** All numbers in one array; the column is empty afterwards. */
  take(): Float64Array {
    const all = new Float64Array(this.length);
    this.full.push(this.chunk.subarray(0, this.used));
    let at = 0;
    for (const chunk of this.full.splice(0)) {
      all.set(chunk, at);
      at += chunk.length;
    }
    this.used = 0;
    return all;
  }
}
