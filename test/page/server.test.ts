import { readFileSync, renameSync, rmSync, writeFileSync } from "node:fs";
import { createServer } from "node:http";
import type { AddressInfo } from "node:net";
import { networkInterfaces } from "node:os";
import { join } from "node:path";
import { afterAll, beforeAll, describe, expect, it, vi } from "vitest";
import type { PageData } from "../../src/review/page-data.js";
import type { Program } from "../cli/program.js";
import { installPage, type Preview, startPreview } from "./installed.js";
import { rawRequest } from "./raw-http.js";
import { Workshop, yard } from "./throws.js";

// the program and its page are bundled first
vi.setConfig({ testTimeout: 120_000, hookTimeout: 120_000 });

let program: Program;
let preview: Preview;
const workshop = new Workshop(yard());

beforeAll(async () => {
  program = await installPage();
  preview = await startPreview(program, [workshop.path]);
});
afterAll(async () => {
  await preview?.stop();
  program?.remove();
  workshop.remove();
});

const port = () => Number(new URL(preview.url).port);
const ask = (path: string, ...fields: string[]) =>
  rawRequest(port(), [`GET ${path} HTTP/1.1`, `Host: 127.0.0.1:${port()}`, "Connection: close", ...fields]);
const data = async (looking?: string, { url } = preview): Promise<PageData> =>
  (await fetch(`${url}data.json${looking ? `?throw=${looking}` : ""}`)).json();

/** The first data that are as wanted. */
async function until(wanted: (data: PageData) => boolean, from = preview): Promise<PageData> {
  for (let left = 400; left > 0; left--) {
    const now = await data(undefined, from);
    if (wanted(now)) return now;
    await new Promise((done) => setTimeout(done, 50));
  }
  throw new Error(`never came: ${JSON.stringify(await data(undefined, from)).slice(0, 2000)}`);
}
const isBaked = ({ throws }: PageData) =>
  throws.length > 0 && throws.every(({ stamp }) => stamp !== undefined);
const arrivalOf = ({ throws }: PageData, name = "lob") =>
  throws.find((shown) => shown.name === name)?.takes[0]?.record.arrival.centerOfMass[2] ?? Number.NaN;

describe("the preview's data", () => {
  it("hold every throw with its takes, in the file's order", async () => {
    const { title, throws, props } = await until(isBaked);
    expect(title).toBe("yard.throws.yaml");
    expect(throws.map(({ name, takes }) => [name, takes.length])).toEqual([
      ["lob", 4],
      ["skim", 3],
    ]);
    expect(Object.keys(props).sort()).toEqual(["lid", "spanner"]);
    expect(throws[0].spin).toEqual({ axis: "middle", turns: "1.5" });
  });

  it("name files that hold the clips they name", async () => {
    const { throws } = await until(isBaked);
    for (const { takes } of throws)
      for (const { file, clip } of takes) {
        const glb = Buffer.from(await (await fetch(`${preview.url}files/${file}`)).arrayBuffer());
        const json = JSON.parse(glb.toString("utf8", 20, 20 + glb.readUInt32LE(12)));
        expect(json.animations.map((animation: { name: string }) => animation.name)).toContain(clip);
      }
  });
});

describe("the preview's server", () => {
  it.each(["GET / HTTP/1.1", "GET /data.json HTTP/1.1", "GET /events HTTP/1.1", "GET /page.js HTTP/1.1"])(
    "refuses %s for another host's name",
    async (line) => {
      for (const host of ["example.org", `example.org:${port()}`, "127.0.0.1", `127.0.0.1:${port() + 1}`, ""])
        expect((await rawRequest(port(), [line, `Host: ${host}`, "Connection: close"])).status).toBe(403);
      // HTTP/1.0 may come without a host
      const old = line.replace("1.1", "1.0");
      expect((await rawRequest(port(), [old])).status).toBe(403);
    },
  );

  it("refuses other origins, and answers its own", async () => {
    for (const origin of [
      "http://example.org",
      "null",
      `http://127.0.0.1:${port() + 1}`,
      `https://127.0.0.1:${port()}`,
    ])
      expect((await ask("/data.json", `Origin: ${origin}`)).status).toBe(403);
    expect((await ask("/data.json", `Origin: http://127.0.0.1:${port()}`)).status).toBe(200);
  });

  it("answers under the machine's own name for itself too", async () => {
    const answer = await rawRequest(port(), [
      "GET / HTTP/1.1",
      `Host: localhost:${port()}`,
      "Connection: close",
    ]);
    expect(answer.status).toBe(200);
  });

  it.each([
    "/../package.json",
    "/..%2fpackage.json",
    "/files/../page.js",
    "/files/..%2fpage.js",
    "/files/%2e%2e%2fyard.throws.yaml",
    "/files/yard.throws.yaml",
    "/files/spanner.glb",
    "/files/",
    "/files/%",
    "/files/lob.glb/",
    "//page.js",
    "/page.js/",
    "/page.ts",
    "/data.json/",
    "/__proto__",
    "http://127.0.0.1/page.js",
    "*",
    "/%00",
  ])("has nothing at %s", async (path) => {
    await until(isBaked);
    expect((await ask(path)).status).toBe(404);
  });

  it.each(["POST", "PUT", "DELETE", "OPTIONS", "PATCH", "TRACE"])("does nothing on %s", async (method) => {
    const { status, headers } = await rawRequest(port(), [
      `${method} /data.json HTTP/1.1`,
      `Host: 127.0.0.1:${port()}`,
      "Connection: close",
    ]);
    expect(status).toBe(405);
    expect(headers.allow).toBe("GET, HEAD");
  });

  it("answers HEAD without a body", async () => {
    const { status, headers, body } = await rawRequest(port(), [
      "HEAD /page.js HTTP/1.1",
      `Host: 127.0.0.1:${port()}`,
      "Connection: close",
    ]);
    expect(status).toBe(200);
    expect(Number(headers["content-length"])).toBeGreaterThan(1000);
    expect(body).toBe("");
  });

  it.each(["/", "/data.json", "/page.js", "/nothing"])("sends strict headers with %s", async (path) => {
    const { headers } = await ask(path);
    const policy = headers["content-security-policy"];
    expect(policy).toMatch(/^default-src 'none';/);
    expect(policy).not.toMatch(/unsafe|\*|https?:/);
    expect(headers["x-content-type-options"]).toBe("nosniff");
    expect(headers["cache-control"]).toBe("no-store");
    expect(headers["access-control-allow-origin"]).toBeUndefined();
  });

  it("listens on the loopback address alone", async () => {
    const others = Object.values(networkInterfaces())
      .flatMap((addresses) => addresses ?? [])
      .filter(({ internal, family }) => !internal && family === "IPv4");
    for (const { address } of others) await expect(fetch(`http://${address}:${port()}/`)).rejects.toThrow();
    const { address } = others[0] ?? { address: "127.0.0.2" };
    await expect(fetch(`http://${address}:${port()}/`)).rejects.toThrow();
  });
});

describe("a preview of a throw file that changes", () => {
  it("shows a throw as it is saved, and bakes no other anew", async () => {
    const before = await until(isBaked);
    workshop.save(yard(4));
    const after = await until((now) => arrivalOf(now) > arrivalOf(before) + 0.5);
    expect(arrivalOf(after)).toBeCloseTo(arrivalOf(before) + 1, 1);
    expect(after.throws[1].stamp).toBe(before.throws[1].stamp);
    expect(after.throws[0].stamp).not.toBe(before.throws[0].stamp);
  });

  it("sees a file that is saved by renaming another", async () => {
    const before = await until(isBaked);
    const other = join(workshop.folder, ".yard.swp");
    writeFileSync(other, yard(5));
    renameSync(other, workshop.path);
    await until((now) => arrivalOf(now) > arrivalOf(before) + 0.5);
  });

  it("says what is wrong and where, keeps the old motion, and recovers", async () => {
    const before = await until(isBaked);
    workshop.save(yard(5).replace("takes: 4", "takes: four"));
    // the save before may still be read while this one is written, half of it: that error passes
    const { error, throws } = await until((now) => now.error?.message.includes("throws.lob.takes") === true);
    expect(error?.line).toBe(11);
    expect(error?.column).toBe(5);
    expect(error?.message).toMatch(/yard\.throws\.yaml:11:5 throws\.lob\.takes: .*four/);
    expect(throws).toEqual(before.throws);
    await expect.poll(() => preview.errors()).toContain("throws.lob.takes");
    workshop.save(yard(5));
    expect((await until((now) => now.error === undefined)).throws).toEqual(before.throws);
  });

  it("says so of a throw that cannot be, while the others go on", async () => {
    const before = await until(isBaked);
    const wrong = yard(5).replace("after: 0.8..0.9", "speed: 1").replace("turns: 2..3", "turns: 4");
    workshop.save(
      wrong.replace(
        "arrive: { at: [0, 1, 5], speed: 1 }",
        "arrive: { at: [0, 1, 5] }\n    arc: { speed: 1 }",
      ),
    );
    const { error, throws } = await until(
      (now) => now.error !== undefined && now.throws[1].stamp !== before.throws[1].stamp,
    );
    expect(error?.message).toMatch(/throws\.lob\.arc\.speed: /);
    expect(throws[0]).toEqual(before.throws[0]);
    expect(throws[1].takes[0].record.turns).toBeCloseTo(4, 6);
    workshop.save(yard(5));
    await until((now) => now.error === undefined && isBaked(now));
  });

  it("weighs a model anew that was saved", async () => {
    const before = await until(isBaked);
    const model = join(workshop.folder, "spanner.glb");
    const spanner = readFileSync(model);
    writeFileSync(model, readFileSync(new URL("../../assets/props/marlinspike.glb", import.meta.url)));
    const after = await until((now) => now.props.spanner.mass !== before.props.spanner.mass);
    expect(after.props.lid).toEqual(before.props.lid);
    rmSync(model);
    const { error } = await until((now) => now.error !== undefined);
    expect(error?.message).toMatch(
      /yard\.throws\.yaml:4:5 props\.spanner\.model: spanner\.glb: does not exist/,
    );
    writeFileSync(model, spanner);
    await until((now) => now.error === undefined && now.props.spanner.mass === before.props.spanner.mass);
  });

  it("takes up new throws, and drops old ones", async () => {
    workshop.save(yard(5).replace("  skim:", "  slide:"));
    const { throws } = await until((now) => isBaked(now) && now.throws.some(({ name }) => name === "slide"));
    expect(throws.map(({ name }) => name)).toEqual(["lob", "slide"]);
    expect((await ask("/files/skim.glb")).status).toBe(404);
    workshop.save(yard());
    await until((now) => isBaked(now) && now.throws.some(({ name }) => name === "skim"));
  });

  it("tells the page of a change", async () => {
    const response = await fetch(`${preview.url}events`);
    expect(response.headers.get("content-type")).toBe("text/event-stream");
    const reader = (response.body as ReadableStream<Uint8Array>).getReader();
    const decoder = new TextDecoder();
    let heard = "";
    workshop.save(yard(3.5));
    while (!heard.includes("event: change\n")) heard += decoder.decode((await reader.read()).value);
    await reader.cancel();
    workshop.save(yard());
    await until((now) => isBaked(now) && Math.abs(arrivalOf(now) - 3) < 0.1);
  });
});

describe("a preview", () => {
  it("bakes first what is looked at", async () => {
    const many = Array.from({ length: 6 }, (_, i) =>
      yard().slice(yard().indexOf("  lob:")).replace("lob:", `lob${i}:`).replace("skim:", `skim${i}:`),
    );
    const other = new Workshop(yard() + many.join(""));
    const preview = await startPreview(program, [other.path]);
    try {
      await data("skim5", preview);
      const order: string[] = [];
      await until((now) => {
        for (const { name, stamp } of now.throws) if (stamp && !order.includes(name)) order.push(name);
        return isBaked(now);
      }, preview);
      expect(order.indexOf("skim5")).toBeLessThan(order.indexOf("lob5"));
      expect(order.indexOf("skim5")).toBeLessThan(7);
    } finally {
      await preview.stop();
      other.remove();
    }
  });

  it("leaves the machine to a page that is being opened once it has a throw to show, until it has drawn", async () => {
    const other = new Workshop(yard());
    const preview = await startPreview(program, [other.path]);
    try {
      await fetch(preview.url);
      const count = ({ throws }: PageData) => throws.filter(({ stamp }) => stamp !== undefined).length;
      expect(count(await until((now) => count(now) > 0, preview))).toBe(1);
      // the other one takes some tens of milliseconds
      await new Promise((done) => setTimeout(done, 1000));
      expect(count(await data(undefined, preview))).toBe(1);
      await fetch(`${preview.url}drawn`);
      await until(isBaked, preview);
      // whoever never draws is not waited for
      await fetch(preview.url);
      other.save(yard(4));
      await until((now) => isBaked(now) && arrivalOf(now) > 3.5, preview);
    } finally {
      await preview.stop();
      other.remove();
    }
  });

  it("of a file that is wrong from the start waits for it to be right", async () => {
    const other = new Workshop("props: {");
    const preview = await startPreview(program, [other.path]);
    try {
      expect((await data(undefined, preview)).error?.message).toContain("yard.throws.yaml:1");
      other.save(yard());
      await until((now) => now.error === undefined && isBaked(now), preview);
    } finally {
      await preview.stop();
      other.remove();
    }
  });

  it("is interrupted with 130, and lets go of its port", async () => {
    const first = await startPreview(program, [workshop.path]);
    // a page that listens does not hold it up
    const events = await fetch(`${first.url}events`);
    expect(await first.stop()).toBe(130);
    await events.text().catch(() => undefined);
    const again = await startPreview(program, [workshop.path, "--port", new URL(first.url).port]);
    expect(again.url).toBe(first.url);
    await again.stop();
  });

  it("says so when its port is taken", async () => {
    const other = createServer();
    await new Promise<void>((done) => other.listen(0, "127.0.0.1", done));
    const taken = (other.address() as AddressInfo).port;
    const { code, err } = program.run(["preview", workshop.path, "--port", String(taken)]);
    other.close();
    expect(code).toBe(3);
    expect(err).toBe(
      `port ${taken} of 127.0.0.1: something else is listening there; choose another with --port, or leave it out\n`,
    );
  });

  it.each([
    [["--port", "0"], /--port.*whole number from 1 to 65535/],
    [["--port", "eighty"], /--port.*whole number from 1 to 65535/],
  ])("refuses %j", (args, message) => {
    const { code, err } = program.run(["preview", workshop.path, ...args]);
    expect(code).toBe(2);
    expect(err).toMatch(message);
  });

  it("refuses a throw file that is not there, and a folder that was not baked into", () => {
    const absent = program.run(["preview", join(workshop.folder, "absent.yaml")]);
    expect([absent.code, absent.err]).toEqual([2, expect.stringContaining("does not exist")]);
    const empty = program.run(["preview", workshop.folder]);
    expect([empty.code, empty.err]).toEqual([2, expect.stringContaining("has no takes.json")]);
  });
});
