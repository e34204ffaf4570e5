import { type FileHandle, open } from "node:fs/promises";

/** Characters gathered before they are written. */
const GATHERED = 1 << 20;

/** A file written piece by piece, so that none of it need be kept; whole once it is closed. */
export class TextFile {
  #gathered: string[] = [];
  #size = 0;

  private constructor(private readonly handle: FileHandle) {}

  static async create(path: string): Promise<TextFile> {
    return new TextFile(await open(path, "w"));
  }

  async write(text: string): Promise<void> {
    this.#gathered.push(text);
    this.#size += text.length;
    if (this.#size >= GATHERED) await this.#flush();
  }

  async close(): Promise<void> {
    try {
      await this.#flush();
      await this.handle.sync();
    } finally {
      await this.handle.close();
    }
  }

  /** Lets go of it as it is. */
  abandon(): Promise<void> {
    return this.handle.close().catch(() => undefined);
  }

  async #flush(): Promise<void> {
    const text = this.#gathered.join("");
    this.#gathered = [];
    this.#size = 0;
    await this.handle.writeFile(text);
  }
}
