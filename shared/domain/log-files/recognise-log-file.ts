import { createFileScan } from "./file-scan";
import { finishRecognition } from "./finish-recognition";
import { HEAD_BYTES, isUnreadable, recogniseHead } from "./recognise-head";
import type { Recognition, Unreadable } from "./recognition";

/**
 * Recognises a file held in memory whole. Workers with large files do the same in three calls:
 * {@link recogniseHead} on the first {@link HEAD_BYTES}, {@link createFileScan} over all bytes,
 * {@link finishRecognition}.
 */
export function recogniseLogFile(bytes: Uint8Array): Recognition | Unreadable {
  const head = recogniseHead(bytes.subarray(0, HEAD_BYTES), bytes.length <= HEAD_BYTES);
  if (isUnreadable(head)) return head;
  const scan = createFileScan(head);
  scan.push(bytes);
  return finishRecognition(head, scan.end());
}
