/** Baking waits for a page that is being opened: where there are few cores, each would take the other's time. */

/** ms: a page that nobody looks at draws nothing, and is waited for no longer. */
const LONGEST = 4000;

export class Pause {
  private timer?: NodeJS.Timeout;
  private waiting: (() => void)[] = [];

  get isOn(): boolean {
    return this.timer !== undefined;
  }

  begin(): void {
    clearTimeout(this.timer);
    this.timer = setTimeout(() => this.end(), LONGEST);
  }

  end(): void {
    clearTimeout(this.timer);
    this.timer = undefined;
    this.wake();
  }

  /** Until it ends, or something calls for another look. */
  wait(): Promise<void> {
    return new Promise((done) => this.waiting.push(done));
  }

  wake(): void {
    for (const done of this.waiting.splice(0)) done();
  }
}
