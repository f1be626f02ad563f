import { UNPACK_LIMITS } from "@shared/domain/log-files/containers";
import { UnpackRefused } from "./unpack-refused";

/**
 * Counts what comes out of an archive as it comes, whatever its directory promises, and stops it at
 * {@link UNPACK_LIMITS}. One for each upload; its checkpoint lets a job be cancelled within a member.
 */
export class UnpackBudget {
  private total = 0;

  constructor(
    private readonly checkpoint: () => void,
    private readonly limits: Readonly<Record<keyof typeof UNPACK_LIMITS, number>> = UNPACK_LIMITS,
  ) {}

  /**
   * Passes bytes on while they are within bounds.
   * @param packedBytes bytes of the member in the archive, so far or in all
   */
  async *bounded(
    source: AsyncIterable<Buffer>,
    member: string,
    packedBytes: () => number,
  ): AsyncGenerator<Buffer> {
    const { memberBytes, totalBytes, ratio, ratioCountsFromBytes } = this.limits;
    let bytes = 0;
    for await (const chunk of source) {
      this.checkpoint();
      bytes += chunk.length;
      this.total += chunk.length;
      if (bytes > memberBytes || this.total > totalBytes)
        throw new UnpackRefused("archiveTooLarge", member);
      if (bytes > ratioCountsFromBytes && bytes > packedBytes() * ratio)
        throw new UnpackRefused("archiveTooDense", member);
      yield chunk;
    }
  }

  /** The text made of a sheet is bounded as well: one cell far to the right makes thousands of tabs. */
  textBounds(sheet: string): (bytes: number) => void {
    let made = 0;
    return (bytes) => {
      this.checkpoint();
      made += bytes;
      if (made > this.limits.memberBytes) throw new UnpackRefused("archiveTooLarge", sheet);
    };
  }
}
