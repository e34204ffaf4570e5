import { runInNewContext } from "node:vm";
import { build } from "esbuild";
import { describe, expect, it } from "vitest";
import { ROOT } from "./sources.js";

describe("the library in a browser", () => {
  it("bundles without a Node built-in and runs without Node's globals", async () => {
    const result = await build({
      entryPoints: [`${ROOT}src/index.ts`],
      bundle: true,
      platform: "browser",
      format: "iife",
      globalName: "tossbake",
      write: false,
      metafile: true,
      logLevel: "silent",
      // glTF-Transform names them in a class for Node only, which falls away; what does not is found just below
      external: ["node:*"],
    });
    const [output] = Object.values(result.metafile.outputs);
    expect(output.imports).toEqual([]);
    const code = result.outputFiles[0].text;
    expect(code).not.toMatch(/\brequire\(|\bimport\(/);

    // A browser's globals that the parts may touch while they load; no process, no Buffer, no require
    const globals = { TextDecoder, TextEncoder, URL, console, atob, btoa };
    const height = runInNewContext(
      `${code};
      tossbake.fly({
        centerOfMass: [0, 1, 0], velocity: [0, 2, 0], gravity: [0, -10, 0],
        orientation: [0, 0, 0, 1], spin: [0, 0, 0], moments: [1, 2, 3], duration: 1,
      }).centerOfMass(0.5)[1]`,
      globals,
    );
    // 1 + 2·0.5 − 10·0.5²/2 (Galileo's parabola)
    expect(height).toBeCloseTo(0.75, 12);
  });
});
