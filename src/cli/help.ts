/** What `--help` says over all: the commands by what one does with them, exit codes, and where to read on. */

import type { Command } from "commander";

/** In the order in which somebody new meets them. */
const GROUPS: Readonly<Record<string, Readonly<Record<string, string>>>> = {
  "To begin:": {
    new: "make a folder to start from: a throw file that explains itself, and a prop",
    weigh: "say what a prop is like: mass, balance point, axes, and what a throw about each does",
    schema: "print the throw file's JSON Schema, by which an editor completes and checks it",
  },
  "To make clips:": {
    bake: "solve every throw of a throw file and write its clips and takes.json",
    ways: "list the ways from a throw's release pose to its arrival pose, and the spin for each",
    merge: "put the shards of one batch together",
    csv: "write each take as a table of numbers",
  },
  "To look at them:": {
    preview: "show the takes on a page that bakes again when a file changes",
    strobe: "draw the takes as sheets of pictures",
  },
  "To keep them true:": {
    verify: "say what has drifted since a bake, in words of the motion",
  },
  "For the shell:": {
    completion: "print a script by which the shell completes commands, options and names",
  },
};

const MORE = `
Examples:
  tossbake new first-throws
  tossbake weigh first-throws/anchor.throws.yaml
  tossbake bake first-throws/anchor.throws.yaml -o clips
  tossbake verify first-throws/anchor.throws.yaml -o clips

Exit codes:
  0    done
  1    done, but a check failed: a take missed its mark or could not hold its
       limits, or there is drift
  2    the request is wrong: the message says where, what is wrong and what
       would be right
  3    no fault of the request: the machine will not (a folder that cannot be
       written, a full disk), or tossbake itself is at fault, and says so
  130  interrupted

"tossbake COMMAND --help" says how a command is used. README.md, which comes
with the package, walks through a first throw and tells all that a throw file
can say; "tossbake new" makes one with comments.`;

/** Gives the program its overview, and each of its commands its place in that and a line on where to read on. */
export function describeCommands(program: Command): void {
  for (const command of program.commands) {
    const [group, summaries] =
      Object.entries(GROUPS).find(([, names]) => Object.hasOwn(names, command.name())) ?? [];
    if (group !== undefined) command.helpGroup(group);
    if (summaries) command.summary(summaries[command.name()]);
    command
      .showHelpAfterError(`(tossbake ${command.name()} --help says how it is used)`)
      .addHelpText("after", "\nExit codes, and where to read on: tossbake --help");
  }
  program.addHelpText("after", MORE);
}

/** Commands in the order in which the overview names them; one that it does not know comes last. */
export function inOrder(commands: readonly Command[]): Command[] {
  const names = Object.values(GROUPS).flatMap((group) => Object.keys(group));
  const place = (command: Command) => [...names, command.name()].indexOf(command.name());
  return [...commands].sort((a, b) => place(a) - place(b));
}
