/** HTTP to the letter, as browsers would never send it. */

import { connect } from "node:net";

export interface RawAnswer {
  status: number;
  headers: Record<string, string>;
  body: string;
}

/** Sends the lines of a request's head, ends the connection and answers what came back. */
export function rawRequest(port: number, lines: readonly string[]): Promise<RawAnswer> {
  return new Promise((done, fail) => {
    let text = "";
    const socket = connect(port, "127.0.0.1", () => socket.write(`${lines.join("\r\n")}\r\n\r\n`));
    socket.setEncoding("utf8").on("data", (part: string) => {
      text += part;
    });
    socket.on("error", fail);
    socket.on("close", () => done(parsed(text)));
  });
}

function parsed(text: string): RawAnswer {
  const end = text.indexOf("\r\n\r\n");
  const [first, ...fields] = text.slice(0, end).split("\r\n");
  return {
    status: Number(first.split(" ")[1]),
    headers: Object.fromEntries(
      fields.map((field) => [field.split(": ", 1)[0].toLowerCase(), field.slice(field.indexOf(": ") + 2)]),
    ),
    body: text.slice(end + 4),
  };
}
