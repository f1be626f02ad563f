import type { Certificate, Instrument, InstrumentKind } from "@shared/contracts/evidence";
import { useFormat, useWords } from "@features/i18n";

export const kinds: readonly InstrumentKind[] = [
  "flowMeter",
  "probe",
  "logger",
  "permanentMeter",
  "referenceThermometer",
  "thicknessGauge",
];

/** What an instrument is called here: its label, else its serial. */
export function nameOf({ label, serial }: Pick<Instrument, "label" | "serial">): string {
  return label ?? serial;
}

/** In what a certificate's uncertainty is given: of flow, of a temperature or of a thickness. */
export function unitOf(kind: InstrumentKind): "%" | "K" | "mm" | "s" {
  if (kind === "flowMeter" || kind === "permanentMeter") return "%";
  if (kind === "probe" || kind === "referenceThermometer") return "K";
  return kind === "thicknessGauge" ? "mm" : "s";
}

/** “± 1.0 %, k = 2”. */
export function useUncertaintyWords(): (kind: InstrumentKind, certificate: Certificate) => string {
  const t = useWords("kit");
  const format = useFormat();
  return (kind, { expanded, k }) =>
    t("certificate.uncertainty", {
      value: format.number(expanded),
      unit: unitOf(kind),
      k: format.number(k, Number.isInteger(k) ? 0 : 2),
    });
}
