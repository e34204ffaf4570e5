import { Command } from "commander";
import { afterAll, beforeAll, describe, expect, it, vi } from "vitest";
import { main, ownFault } from "../../src/cli/main.js";
import { VERSION } from "../../src/record/version.js";
import { run } from "./folder.js";
import { Program } from "./program.js";

// Words and exit codes: the project's own choice.

/** The command tree as commander has it, caught on its way. */
async function tree(): Promise<Command> {
  let program: Command | undefined;
  const spy = vi.spyOn(Command.prototype, "parseAsync").mockImplementation(function (this: Command) {
    program = this;
    return Promise.resolve(this);
  });
  try {
    await main([]);
  } finally {
    spy.mockRestore();
  }
  return program!;
}

describe("help for somebody new", () => {
  it("has every command in a group, under the words of what one does with it", async () => {
    const { commands } = await tree();
    expect(commands.length).toBeGreaterThan(5);
    for (const command of commands) {
      expect(command.helpGroup(), command.name()).toMatch(/^(To|For) /);
      expect(command.summary(), command.name()).not.toBe("");
    }
  });

  it("fits 80 columns, begins with new, tells the exit codes and where to read on", async () => {
    const { out } = await run("--help");
    for (const line of out.split("\n")) expect(line.length, line).toBeLessThanOrEqual(80);
    expect(out.search(/^ {2}new /m)).toBeLessThan(out.search(/^ {2}bake /m));
    for (const code of ["0", "1", "2", "3", "130"]) expect(out).toMatch(new RegExp(`^ {2}${code} +\\w`, "m"));
    expect(out).toContain("README.md");
  });

  it("explains every option and argument of every command", async () => {
    for (const command of (await tree()).commands) {
      for (const { flags, description } of command.options)
        expect(description, `${command.name()} ${flags}`).not.toBe("");
      for (const argument of command.registeredArguments)
        expect(argument.description, `${command.name()} ${argument.name()}`).not.toBe("");
      const { out } = await run(command.name(), "--help");
      expect(out).toContain("Exit codes, and where to read on: tossbake --help");
      for (const line of out.split("\n")) expect(line.length, line).toBeLessThanOrEqual(130);
    }
  });

  it("is what the program's name alone gets", async () => {
    expect((await run()).err).toBe((await run("--help")).out);
  });
});

describe("a slip of the keys", () => {
  it.each([
    [["bak"], "Did you mean bake?"],
    [["vreify"], "Did you mean verify?"],
    [["bake", "x.yaml", "--onyl", "lob"], "Did you mean --only?"],
  ])("%j: %s", async (args, suggestion) => {
    const { code, err } = await run(...args);
    expect(code).toBe(2);
    expect(err).toContain(suggestion);
  });

  it("within a command is sent to that command's help", async () => {
    expect((await run("bake", "--fast")).err).toContain("(tossbake bake --help says how it is used)");
  });
});

describe("a fault of the program's own", () => {
  it("is neither drift nor a wrong request: 3, its own words, and the stack", async () => {
    const spies = [vi.spyOn(process.stdout, "write"), vi.spyOn(process.stderr, "write")];
    let err = "";
    spies[0].mockImplementation(() => {
      throw new TypeError("nobody foresaw this");
    });
    spies[1].mockImplementation((text) => {
      err += text;
      return true;
    });
    try {
      expect(await main(["schema"])).toBe(3);
    } finally {
      for (const spy of spies) spy.mockRestore();
    }
    expect(err).toMatch(/^This is a fault of tossbake .* itself, not of what was asked for\./);
    expect(err).toContain(VERSION);
    expect(err).toMatch(/TypeError: nobody foresaw this\n +at /);
  });

  it("is told also where what was thrown is no error", () => {
    expect(ownFault("a text")).toMatch(/a text\n$/);
  });

  describe("in a process of its own", () => {
    let program: Program;
    beforeAll(async () => {
      program = await Program.install();
    });
    afterAll(() => program.remove());

    it.each([
      ["while a command runs", "throw new TypeError('broken')"],
      ["where nobody waits for it", "setTimeout(() => { throw new TypeError('broken') })"],
      ["as a promise that nobody waits for", "Promise.reject(new TypeError('broken'))"],
    ])("%s", (_, fault) => {
      const hook = `process.stdout.write = () => { ${fault}; return true; }`;
      const { code, err } = program.run(["schema"], {
        node: ["--import", `data:text/javascript,${encodeURIComponent(hook)}`],
      });
      expect(err).toMatch(/^This is a fault of tossbake/);
      expect(err).toContain("TypeError: broken");
      expect(code).toBe(3);
    });
  });
});
