import { useWords, type Format } from "@features/i18n";
import { Banner, TextLink } from "@features/ui";
import { evidencePaths } from "./evidence-paths";

/** Where the meter was set to another bore than the pipe has: a way to put the flow right by it. */
export function BoreCorrection(props: {
  enteredMm: number | null;
  trueMm: number | null;
  format: Format;
  at: { siteId: string; loopId: string; pointId: string };
}) {
  const t = useWords("installation");
  const { enteredMm, trueMm, format, at } = props;
  if (enteredMm === null || trueMm === null) return null;
  const percent = 100 * ((trueMm / enteredMm) ** 2 - 1);
  if (Math.abs(percent) < 0.005) return null;
  return (
    <Banner
      kind="look"
      lead={t(percent > 0 ? "pipe.readsLow" : "pipe.readsHigh", {
        percent: format.number(Math.abs(percent), 4),
      })}
      action={
        <TextLink
          label={t("pipe.scale")}
          href={evidencePaths.scaleByBore(at.siteId, at.loopId, at.pointId, {
            enteredMm,
            trueMm: Number(trueMm.toFixed(4)),
          })}
        />
      }
    >
      {t("pipe.differs", {
        entered: format.withUnit(enteredMm, "pipeSize", 2),
        bore: format.withUnit(trueMm, "pipeSize", 4),
      })}
    </Banner>
  );
}
