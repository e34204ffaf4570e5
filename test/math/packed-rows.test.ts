import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { PackedRows } from "../../src/math/packed-rows.js";

// What is expected is what was put in.

const rows = fc.array(
  fc.oneof(
    fc.float64Array({ maxLength: 30 }),
    // about and above the 2^16 numbers of a block
    fc.constantFrom(30_000, 65_536, 70_000).map((length) => new Float64Array(length).map((_, i) => i)),
  ),
  { maxLength: 12 },
);

describe("packed rows", () => {
  it("give back each row as it was, of whatever length, in blocks full or larger than any", () => {
    fc.assert(
      fc.property(rows, (given) => {
        const packed = new PackedRows();
        for (const row of given) packed.push(row);
        for (const [i, row] of given.entries()) {
          const { length } = row;
          const start = packed.start(i);
          // arrays of numbers, told apart to the bit
          expect(Buffer.compare(bytes(packed.row(i)), bytes(row))).toBe(0);
          expect(Buffer.compare(bytes(packed.block(i).subarray(start, start + length)), bytes(row))).toBe(0);
        }
      }),
      { numRuns: 50 },
    );
  });

  it("keep what they were given when that is changed afterwards", () => {
    const packed = new PackedRows();
    const row = Float64Array.of(1, 2, 3);
    packed.push(row);
    row.fill(0);
    expect([...packed.row(0)]).toEqual([1, 2, 3]);
  });
});

const bytes = ({ buffer, byteOffset, byteLength }: Float64Array) =>
  Buffer.from(buffer, byteOffset, byteLength);
