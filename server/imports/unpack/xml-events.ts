import { SaxesParser } from "saxes";
import { UnpackRefused } from "./unpack-refused";

/** The parts of a workbook nest no deeper than a dozen. */
const MAX_DEPTH = 64;
/** Bytes without a tag: a cell's text may be 32,767 characters (ECMA-376 part 1, 18.18). */
const MAX_BYTES_BETWEEN_TAGS = 1 << 20;

export interface XmlHandlers {
  /** @param name without its namespace prefix */
  open?(name: string, attribute: (name: string) => string | undefined): void;
  text?(text: string): void;
  close?(name: string): void;
}

/**
 * Reads a part of a workbook as a stream of events, holding no more than one tag and its text. A
 * document type is refused at once: it is where entities that unfold without end are declared, and no
 * workbook has one.
 */
export class XmlEvents {
  private readonly parser = new SaxesParser();
  private readonly decoder: { decode(bytes?: Uint8Array, options?: { stream: boolean }): string };
  private depth = 0;
  private bytesSinceTag = 0;

  /** @param part named when it is refused */
  constructor(
    private readonly part: string,
    handlers: XmlHandlers,
    start: Uint8Array,
  ) {
    this.decoder = new TextDecoder(encodingOf(start));
    const { parser } = this;
    parser.on("error", () => {
      throw new UnpackRefused("archiveBroken", part);
    });
    parser.on("doctype", () => {
      throw new UnpackRefused("workbookUnsafe", part);
    });
    parser.on("opentag", ({ name, attributes }) => {
      this.bytesSinceTag = 0;
      if (++this.depth > MAX_DEPTH) throw new UnpackRefused("workbookUnsafe", part);
      handlers.open?.(localName(name), (wanted) => attributeOf(attributes, wanted));
    });
    parser.on("text", (text) => handlers.text?.(text));
    parser.on("cdata", (text) => handlers.text?.(text));
    parser.on("closetag", ({ name }) => {
      this.bytesSinceTag = 0;
      this.depth--;
      handlers.close?.(localName(name));
    });
  }

  push(chunk: Uint8Array): void {
    this.bytesSinceTag += chunk.length;
    this.parser.write(this.decoder.decode(chunk, { stream: true }));
    if (this.bytesSinceTag > MAX_BYTES_BETWEEN_TAGS + chunk.length)
      throw new UnpackRefused("workbookUnsafe", this.part);
  }

  end(): void {
    this.parser.write(this.decoder.decode());
    this.parser.close();
  }
}

/** Reads a whole part through handlers. */
export async function readXml(
  part: string,
  chunks: AsyncIterable<Buffer>,
  handlers: XmlHandlers,
): Promise<void> {
  let events: XmlEvents | null = null;
  for await (const chunk of chunks) {
    events ??= new XmlEvents(part, handlers, chunk);
    events.push(chunk);
  }
  if (events === null) throw new UnpackRefused("archiveBroken", part);
  events.end();
}

/** XML 1.0, appendix F: without a mark a part is UTF-8; the package format allows UTF-16 besides. */
function encodingOf(start: Uint8Array): "utf-8" | "utf-16le" | "utf-16be" {
  if (start[0] === 0xff && start[1] === 0xfe) return "utf-16le";
  return start[0] === 0xfe && start[1] === 0xff ? "utf-16be" : "utf-8";
}

function localName(name: string): string {
  const colon = name.indexOf(":");
  return colon < 0 ? name : name.slice(colon + 1);
}

function attributeOf(attributes: object, wanted: string): string | undefined {
  const own = (attributes as Record<string, unknown>)[wanted];
  if (typeof own === "string") return own;
  // `r:id` may carry another prefix.
  for (const [name, value] of Object.entries(attributes))
    if (name.endsWith(`:${wanted}`) && typeof value === "string") return value;
  return undefined;
}
