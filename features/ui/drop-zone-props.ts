export interface DropZoneProps {
  label: string;
  /** What may be dropped: “.csv, .tsv or .txt, up to 200 MB each”. */
  hint: string;
  onFiles: (files: File[]) => void;
  /** Endings the browser offers first: [".csv", ".tsv"]. */
  accept: readonly string[];
  multiple?: boolean;
  error?: string | null;
  disabled?: boolean;
}
