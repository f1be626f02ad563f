import type { DropZoneProps } from "./drop-zone-props";
import { Banner } from "./banner";

/** Picking a file needs a browser; elsewhere the zone says so instead of doing nothing. */
export function DropZone({ label, hint }: DropZoneProps) {
  return (
    <Banner kind="note" lead={label}>
      {hint}
    </Banner>
  );
}
