import { useWords } from "@features/i18n";
import { Tabs } from "@features/ui";

export type LoopViewName = "energy" | "load";

/** The two views of a loop's page: what it used, and how. */
export function ViewTabs(props: { current: LoopViewName; onChange: (view: LoopViewName) => void }) {
  const t = useWords("load");
  return (
    <Tabs
      label={t("views.label")}
      current={props.current}
      onChange={props.onChange}
      tabs={[
        { key: "energy", label: t("views.energy") },
        { key: "load", label: t("views.load") },
      ]}
    />
  );
}
