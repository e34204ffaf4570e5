// Another day, another clock and other chance than this machine's. Loaded before anything else, with --import.

const RealDate = Date;
const SHIFT = 3.7e11;
globalThis.Date = class extends RealDate {
  constructor(...args) {
    if (args.length === 0) super(RealDate.now() + SHIFT);
    else super(...args);
  }

  static now() {
    return RealDate.now() + SHIFT;
  }
};
Math.random = () => 0.123;
performance.now = () => 42;

process.stderr.write(`${new Date().getFullYear()}\n`);
