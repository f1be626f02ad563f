import type { Readable } from "node:stream";

/** An answer that is not JSON: a CSV or another file, whole or streamed. */
export class FileAnswer {
  constructor(
    readonly file: {
      /** Name offered for saving; any characters, encoded by RFC 6266. */
      readonly name: string;
      readonly contentType: string;
      readonly body: string | Buffer | Readable;
      readonly byteLength?: number;
    },
  ) {}
}
