import { useQuery } from "@tanstack/react-query";
import { useLocalSearchParams } from "expo-router";
import { useState } from "react";
import { View } from "react-native";
import {
  createBuilding,
  removeBuilding,
  updateBuilding,
  type Building,
  type Site,
} from "@shared/contracts/places";
import { Answer, call } from "@features/api";
import { useWords } from "@features/i18n";
import {
  Button,
  Card,
  Chip,
  EmptyState,
  Form,
  ListRow,
  Screen,
  Sheet,
  TextField,
  useToast,
} from "@features/ui";
import { ArchivedSwitch } from "./archived-switch";
import { PlaceActions } from "./place-actions";
import { placesPaths } from "./places-paths";
import { placesQueries } from "./places-queries";
import { useSave } from "./use-save";

type Open = { readonly building: Building | null } | null;

/** The buildings of a site; one opens in a sheet beside the list. */
export function BuildingsScreen() {
  const t = useWords("places");
  const { siteId, archived } = useLocalSearchParams<{ siteId: string; archived?: string }>();
  const showArchived = archived === "yes";
  const site = useQuery(placesQueries.site(siteId));
  const buildings = useQuery(placesQueries.buildings(siteId, showArchived));
  const [open, setOpen] = useState<Open>(null);
  const mayAdd = site.data?.can.addLoop ?? false;
  const add = (
    <Button icon="plus" label={t("building.add")} onPress={() => setOpen({ building: null })} />
  );
  const crumbs = [
    { label: t("sites.title"), href: placesPaths.sites },
    ...(site.data ? [{ label: site.data.name, href: placesPaths.site(siteId) }] : []),
  ];
  return (
    <Screen title={t("buildings.title")} crumbs={crumbs} narrow actions={mayAdd ? add : undefined}>
      <Answer of={site.data ? buildings : { ...site, data: undefined }}>
        {({ items }) => (
          <View style={{ gap: 16 }}>
            {items.length === 0 ? (
              <EmptyState
                title={t("buildings.none")}
                detail={t("buildings.noneDetail")}
                action={mayAdd ? add : undefined}
              />
            ) : (
              <BuildingList items={items} onOpen={(building) => setOpen({ building })} />
            )}
            <ArchivedSwitch shown={showArchived} />
          </View>
        )}
      </Answer>
      {site.data ? (
        <Sheet
          kind="side"
          open={open !== null}
          title={open?.building ? t("building.edit") : t("building.add")}
          onClose={() => setOpen(null)}
        >
          {open ? (
            <BuildingEditor
              key={open.building?.id ?? "new"}
              site={site.data}
              building={open.building}
              onDone={() => setOpen(null)}
            />
          ) : null}
        </Sheet>
      ) : null}
    </Screen>
  );
}

function BuildingList(props: { items: readonly Building[]; onOpen: (building: Building) => void }) {
  const t = useWords("places");
  return (
    <Card pad={4} label={t("buildings.title")}>
      {props.items.map((building, index) => (
        <ListRow
          key={building.id}
          first={index === 0}
          title={building.name}
          {...(building.note ? { detail: building.note } : {})}
          trail={building.archivedAt === null ? undefined : <Chip label={t("archive.archived")} />}
          {...(building.can.edit ? { onPress: () => props.onOpen(building) } : {})}
        />
      ))}
    </Card>
  );
}

function BuildingEditor(props: { site: Site; building: Building | null; onDone: () => void }) {
  const { site, building, onDone } = props;
  const t = useWords("places");
  const toast = useToast();
  const [name, setName] = useState(building?.name ?? "");
  const [note, setNote] = useState(building?.note ?? "");
  const [problem, setProblem] = useState<string | null>(null);
  const saving = useSave(() => {
    const body = { name: name.trim(), note: note.trim() || null };
    return building === null
      ? call(createBuilding, { params: { siteId: site.id }, body })
      : call(updateBuilding, { params: { buildingId: building.id }, body });
  }, ["name", "note"]);
  const submit = () => {
    if (name.trim() === "") {
      setProblem(t("building.nameNeeded"));
      return;
    }
    saving.save(undefined, (saved) => {
      const key = building === null ? "building.added" : "save.saved";
      toast({ message: t(key, { name: saved.name }) });
      onDone();
    });
  };
  return (
    <View style={{ gap: 24 }}>
      <Form
        label={building ? t("building.edit") : t("building.add")}
        onSubmit={submit}
        errors={saving.errors.form}
      >
        <TextField
          label={t("building.name")}
          value={name}
          onChange={(text) => {
            setName(text);
            setProblem(null);
            saving.reset();
          }}
          error={saving.errors.field("name") ?? problem}
          required
          autoFocus
          autoComplete="off"
        />
        <TextField
          label={t("building.note")}
          hint={t("building.noteHint")}
          value={note}
          onChange={setNote}
          error={saving.errors.field("note")}
          autoComplete="off"
        />
        <Button
          submit
          label={building === null ? t("building.add") : t("form.save")}
          busy={saving.busy}
        />
      </Form>
      {building ? (
        <PlaceActions
          kind="building"
          name={building.name}
          archived={building.archivedAt !== null}
          can={building.can}
          onArchive={(archived) =>
            call(updateBuilding, { params: { buildingId: building.id }, body: { archived } })
          }
          onRemove={() => call(removeBuilding, { params: { buildingId: building.id } })}
          onGone={onDone}
        />
      ) : null}
    </View>
  );
}
