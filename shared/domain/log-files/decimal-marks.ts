import type { ColumnEvidence, Place } from "./column-evidence";
import type { DecimalMark } from "./recipe";

/** The decimal mark of one column: settled with its proof, or the cell that could be read either way. */
export type MarkFinding =
  | {
      readonly mark: DecimalMark;
      readonly proof: Place | null;
      readonly certainty: "proved" | "likely";
      readonly question: null;
    }
  | {
      readonly mark: DecimalMark;
      readonly proof: null;
      readonly certainty: "likely";
      readonly question: Place;
    };

/** Warmer than any loop: readings like 6,789 °C are 6.789 °C with the other mark. */
const HOTTEST_LOOP = 500;

/**
 * Settles the decimal mark column by column. A column's own cells decide first; one whose cells can be read
 * either way (`12,345`) follows the other columns, or the fact that a temperature cannot be in thousands.
 * Where two columns disagree, or one column shows both, somebody must say.
 * @param temperatures indices of columns that hold temperatures
 */
export function findDecimalMarks(
  columns: readonly ColumnEvidence[],
  temperatures: readonly number[],
  isUnquotedCommaFile: boolean,
): readonly MarkFinding[] {
  const proofs = columns.map(proofOf);
  const proved = new Set(
    proofs.flatMap((proof) => (proof === null || proof === "both" ? [] : [proof.mark])),
  );
  const hints = new Set(
    temperatures.flatMap((index) => hintOf(columns[index], proofs[index] ?? null)),
  );
  // A comma file without quotes cannot hold decimal commas.
  const fallback: DecimalMark | null = single(proved) ?? single(hints) ?? null;
  return columns.map((column, index): MarkFinding => {
    const proof = proofs[index] as Proof;
    if (proof === "both") return ask(fallback ?? ".", column.commaProof as Place);
    if (proof !== null) return { ...proof, certainty: "proved", question: null };
    const own = single(new Set(temperatures.includes(index) ? hintOf(column, null) : []));
    const open = column.eitherPoint ?? column.eitherComma;
    const mark =
      own ?? fallback ?? (isUnquotedCommaFile && column.eitherComma === null ? "." : null);
    if (open === null)
      return { mark: mark ?? ".", proof: null, certainty: "likely", question: null };
    // `12.345` beside proved commas may be a thousand's point: only its own proof could tell.
    const against = mark !== null && own === null && readsAsThousands(column, mark);
    if (mark === null || against) return ask(mark ?? ".", open);
    return { mark, proof: open, certainty: "likely", question: null };
  });
}

type Proof = { readonly mark: DecimalMark; readonly proof: Place } | "both" | null;

function proofOf(column: ColumnEvidence): Proof {
  const point = column.pointProof;
  const comma = column.commaProof;
  if (point !== null && comma !== null) return "both";
  if (
    column.eitherPoint !== null &&
    column.eitherComma !== null &&
    point === null &&
    comma === null
  )
    return "both";
  if (point !== null) return { mark: ".", proof: point };
  return comma === null ? null : { mark: ",", proof: comma };
}

/** The mark that keeps an undecided temperature column out of the thousands. */
function hintOf(column: ColumnEvidence | undefined, proof: Proof): readonly DecimalMark[] {
  if (column === undefined || proof !== null) return [];
  if (column.eitherPoint === null && column.eitherComma === null) return [];
  const marks: readonly DecimalMark[] = [".", ","];
  return marks.filter((mark) => {
    const range = column.range(mark);
    return range !== null && range.max < HOTTEST_LOOP && range.min > -HOTTEST_LOOP;
  });
}

function readsAsThousands(column: ColumnEvidence, mark: DecimalMark): boolean {
  return mark === "." ? column.eitherComma !== null : column.eitherPoint !== null;
}

function single(marks: ReadonlySet<DecimalMark>): DecimalMark | null {
  return marks.size === 1 ? ([...marks][0] as DecimalMark) : null;
}

function ask(mark: DecimalMark, question: Place): MarkFinding {
  return { mark, proof: null, certainty: "likely", question };
}
