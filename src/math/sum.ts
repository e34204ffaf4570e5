import { sumError } from "./elementary/exact.js";

/**
 * A running sum of finite numbers whose rounding errors are kept apart (Neumaier, Zeitschrift für angewandte Mathematik und Mechanik 54, 39,
 * 1974): as good as one computed with twice the digits and rounded once.
 */
export class CompensatedSum {
  #sum = 0;
  #errors = 0;

  add(x: number): void {
    const next = this.#sum + x;
    this.#errors += sumError(this.#sum, x, next);
    this.#sum = next;
  }

  get value(): number {
    return this.#sum + this.#errors;
  }
}
