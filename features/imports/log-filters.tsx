import { useQuery } from "@tanstack/react-query";
import { router, useLocalSearchParams } from "expo-router";
import { importState, type ImportState, type ImportSummary } from "@shared/contracts/imports";
import { useWords } from "@features/i18n";
import { FieldRow, SelectField } from "@features/ui";
import type { ImportFilters } from "./imports-queries";
import { placesToImportQuery } from "./imports-queries";
import { importPeopleQuery } from "./result-queries";

const ALL = "all";

/** What the list of imports is narrowed to; it lives in the URL. */
export function useLogFilters(): ImportFilters {
  const { site, point, state, by } = useLocalSearchParams<{
    site?: string;
    point?: string;
    state?: string;
    by?: string;
  }>();
  return {
    siteId: site,
    pointId: point,
    state: importState.options.find((known): known is ImportState => known === state),
    personId: by,
  };
}

/** Site, point, state and person; points are those of the imports that are shown. */
export function LogFilters({ imports }: { imports: readonly ImportSummary[] }) {
  const t = useWords("logs");
  const ofImports = useWords("imports");
  const { siteId, pointId, state, personId } = useLogFilters();
  const sites = useQuery(placesToImportQuery.sites);
  const people = useQuery(importPeopleQuery);
  const points = new Map(
    imports.map(({ point, loop }) => [point.id, `${loop.tag} ${point.code} ${point.name}`]),
  );
  const set = (name: string) => (value: string) =>
    router.setParams({ [name]: value === ALL ? undefined : value });
  const options = (all: string, items: readonly { value: string; label: string }[]) => [
    { value: ALL, label: all },
    ...items,
  ];
  const siteOptions = (sites.data?.items ?? []).map(({ id, name }) => ({ value: id, label: name }));
  const peopleOptions = (people.data?.items ?? []).map(({ accountId, name }) => ({
    value: accountId,
    label: name,
  }));
  return (
    <FieldRow>
      {siteOptions.length > 1 ? (
        <SelectField
          label={ofImports("logs.site")}
          value={siteId ?? ALL}
          options={options(ofImports("logs.allSites"), siteOptions)}
          onChange={set("site")}
        />
      ) : null}
      {points.size > 1 || pointId !== undefined ? (
        <SelectField
          label={t("filter.point")}
          value={pointId ?? ALL}
          options={options(
            t("filter.allPoints"),
            [...points].map(([value, label]) => ({ value, label })),
          )}
          onChange={set("point")}
        />
      ) : null}
      <SelectField
        label={t("filter.state")}
        value={state ?? ALL}
        options={options(
          t("filter.allStates"),
          importState.options.map((value) => ({ value, label: ofImports(`state.${value}`) })),
        )}
        onChange={set("state")}
      />
      {peopleOptions.length > 1 || personId !== undefined ? (
        <SelectField
          label={t("filter.person")}
          value={personId ?? ALL}
          options={options(t("filter.allPeople"), peopleOptions)}
          onChange={set("by")}
        />
      ) : null}
    </FieldRow>
  );
}
