/** The record of one shard: a line a take, with its exact launch, from which the whole batch's takes.json is made. */

import { createReadStream } from "node:fs";
import { createInterface } from "node:readline";
import type { Planned, Shard } from "../bake/plan.js";
import { isChain } from "../bake/plan.js";
import { RequestError } from "../math/request-error.js";
import type { TakesRecord } from "../record/clip-record.js";
import type { MadePart } from "./batch.js";
import type { TextSink, Told } from "./batch-record.js";
import { isShardHead, isShardLine } from "./shard-form.js";

/** A throw or chain of the batch. */
export interface ShardEntry {
  name: string;
  prop: string;
  /** Of the prop, m. */
  reach: number;
  /** Of a chain. */
  throws?: string[];
}

/** The first line. */
export interface ShardHead {
  shard: Shard;
  record: Omit<TakesRecord, "clips">;
  /** In the record's order. */
  entries: ShardEntry[];
}

/** The lines after it: takes made or left out, in the record's order, and the last one. */
export type ShardLine =
  | ({ of: string } & Told)
  | { of: string; left: { name: string; reason: string } }
  | { end: number };

export const shardName = ({ index, of }: Shard): string => `takes.${index}-of-${of}.jsonl`;

/** Shards among the names of a folder's files. */
export const isShardName = (name: string): boolean => /^takes\.\d+-of-\d+\.jsonl$/.test(name);

export class ShardWriter {
  #lines = 0;

  constructor(
    private readonly sink: TextSink,
    private readonly from: {
      shard: Shard;
      head: Omit<TakesRecord, "clips">;
      plan: readonly Planned[];
      reachOf: (prop: string) => number;
    },
  ) {}

  start(): Promise<void> {
    const { shard, head, plan, reachOf } = this.from;
    const entries = plan.map(
      ({ entry }): ShardEntry => ({
        name: entry.name,
        prop: entry.prop,
        reach: reachOf(entry.prop),
        ...(isChain(entry) && { throws: [...entry.throws] }),
      }),
    );
    return this.#write({ shard, record: head, entries } satisfies ShardHead);
  }

  /** The parts as they come, each written down. */
  async *passing(parts: AsyncIterable<MadePart>): AsyncGenerator<MadePart> {
    for await (const part of parts) {
      const of = part.planned.entry.name;
      for (const { figures, note, compared, text } of part.takes) {
        // its poses are found again from its launches
        const line: ShardLine = { of, figures, note, compared: { course: compared.course }, text };
        await this.#take(line);
      }
      for (const left of part.left) await this.#take({ of, left });
      yield part;
    }
  }

  end = (): Promise<void> => this.#write({ end: this.#lines } satisfies ShardLine);

  async #take(line: ShardLine): Promise<void> {
    this.#lines++;
    await this.#write(line);
  }

  #write = (line: object): Promise<void> => this.sink.write(`${JSON.stringify(line)}\n`);
}

/**
 * A shard's record, opened at its first line.
 *
 * @throws RequestError for a file that is none, or is not whole
 */
export async function readShard(
  path: string,
): Promise<{ head: ShardHead; lines: AsyncGenerator<ShardLine> }> {
  const source = createInterface({ input: createReadStream(path) })[Symbol.asyncIterator]();
  const wrong = (fault: string) => new RequestError([path], fault, "bake this shard again");
  const next = async (): Promise<unknown> => {
    try {
      const { value, done } = await source.next();
      return done ? undefined : JSON.parse(value);
    } catch (error) {
      const code = (error as NodeJS.ErrnoException).code;
      throw wrong(code ? `cannot be read (${code})` : "is not as a shard's record is written");
    }
  };
  const head = await next();
  if (!isShardHead(head)) throw wrong("is not as a shard's record is written");
  return { head: head as ShardHead, lines: following() };

  async function* following(): AsyncGenerator<ShardLine> {
    for (let count = 0; ; count++) {
      const read = await next();
      if (read === undefined) throw wrong("is cut off");
      if (!isShardLine(read)) throw wrong(`is not as a shard's record is written (line ${count + 2})`);
      const line = read as ShardLine;
      if ("end" in line) {
        if (line.end !== count) throw wrong(`has ${count} of its ${line.end} lines`);
        return;
      }
      yield line;
    }
  }
}
