import { describe, expect, it } from "vitest";
import { arctangent, exponential, logarithm, pi, sineCosine } from "./reference.js";

describe("the reference", () => {
  const decimals = (v: bigint, bits: number): string => ((v * 10n ** 50n) >> BigInt(bits)).toString();

  it("has the printed digits", () => {
    // π, ln 2, e: OEIS A000796, A002162, A001113; sin 1, cos 1: OEIS A049469, A049470
    expect(decimals(pi(256), 256)).toBe("314159265358979323846264338327950288419716939937510");
    expect(decimals(logarithm(2, 256), 256)).toBe("69314718055994530941723212145817656807550013436025");
    expect(decimals(exponential(1n << 256n, 256), 256)).toBe(
      "271828182845904523536028747135266249775724709369995",
    );
    expect(decimals(sineCosine(1, 256).sine, 256)).toBe("84147098480789650665250232163029899962256306079837");
    expect(decimals(sineCosine(1, 256).cosine, 256)).toBe(
      "54030230586813971740093660744297660373231042061792",
    );
    // atan 1 = π/4
    expect(decimals(4n * arctangent(1n, 1n, 256), 256)).toBe(decimals(pi(256), 256));
  });
});
