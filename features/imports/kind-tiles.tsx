import { useWords } from "@features/i18n";
import { ChoiceTiles } from "@features/ui";
import type { SeriesKind } from "@shared/domain/readings/reading-columns";

const KINDS: readonly SeriesKind[] = ["instantaneous", "meanFromLabel", "meanToLabel"];

interface KindTilesProps {
  readonly label: string;
  /** Null while it is asked. */
  readonly value: SeriesKind | null;
  readonly columns: 1 | 3;
  readonly onChange: (kind: SeriesKind) => void;
}

/** What one row stands for: a moment, or the mean of the step after or before its time. */
export function KindTiles({ label, value, columns, onChange }: KindTilesProps) {
  const t = useWords("imports");
  return (
    <ChoiceTiles
      label={label}
      value={value}
      columns={columns}
      choices={KINDS.map((kind) => ({
        value: kind,
        label: t(`columns.kind.${kind}`),
        detail: t(`columns.kind.${kind}Hint`),
      }))}
      onChange={onChange}
    />
  );
}
