/** What a preview server serves: data that may change, and the files that they speak of. */

import type { PageData } from "../review/page-data.js";

export interface PreviewSource {
  /** Of what is shown. */
  readonly title: string;
  /** @param looking the throw that is being looked at */
  data(looking?: string): Promise<PageData>;
  /** The content of a .glb that the data name; undefined for any other name. */
  file(name: string): Promise<Uint8Array | undefined>;
  /** Told when `data()` says something new. */
  onChange(listener: () => void): void;
  /** A page is being opened: what it does not show at first can wait. */
  opening?(): void;
  /** It has drawn its first picture. */
  drawn?(): void;
  close(): Promise<void>;
}
