import { useQuery } from "@tanstack/react-query";
import { View } from "react-native";
import { velocityMPerS } from "@shared/domain/pipes/bore";
import { useWords } from "@features/i18n";
import {
  ChoiceTiles,
  FieldRow,
  NumberField,
  PipeSection,
  SelectField,
  Text,
  TextField,
  useBoreText,
  WorkedOutField,
} from "@features/ui";
import { SoftWarning } from "./loop-form";
import { placesQueries } from "./places-queries";
import { pointErrorOf, type PointFormProps } from "./point-form";
import { pipeOf, resolvedPipe } from "./point-values";
import { tagService } from "./service-words";
import { shownRange } from "./shown-range";

/** Walls thinner or thicker than this share of the diameter are rare: the typing may have slipped. */
const usualWallShare = { least: 0.006, most: 0.2 } as const;
/** Water speed at which flow is measured well, m/s (common practice, no source). */
const goodSpeedMPerS = { least: 0.3, most: 3 } as const;

/** The pipe: from a standard table, measured, or not known yet. The bore is worked out at once. */
export function PipeFields(props: PointFormProps) {
  const t = useWords("places");
  const { values, onChange } = props;
  return (
    <>
      <ChoiceTiles
        label={t("pipe.how")}
        value={values.pipeKind}
        columns={3}
        choices={[
          { value: "table", label: t("pipe.byTable"), detail: t("pipe.byTableDetail") },
          { value: "measured", label: t("pipe.measured"), detail: t("pipe.measuredDetail") },
          { value: "unknown", label: t("pipe.unknown"), detail: t("pipe.unknownDetail") },
        ]}
        onChange={(pipeKind) => onChange({ pipeKind })}
      />
      {values.pipeKind === "table" ? <TableFields {...props} /> : null}
      {values.pipeKind === "measured" ? <MeasuredFields {...props} /> : null}
      {values.pipeKind === "unknown" ? null : <PipeResult {...props} />}
    </>
  );
}

function TableFields(props: PointFormProps) {
  const t = useWords("places");
  const { values, onChange, format } = props;
  const tables = useQuery(placesQueries.pipeTables);
  const items = tables.data?.items ?? [];
  const chosen = items.find(({ id }) => id === values.tableId);
  const material = (name: string) => t(`material.${name}`, { defaultValue: name });
  const size = (mm: number) => format.number(format.toDisplay(mm, "pipeSize"), 2);
  return (
    <FieldRow>
      <SelectField
        label={t("pipe.table")}
        hint={tables.isError ? t("pipe.tablesMissing") : t("pipe.tableHint")}
        value={values.tableId}
        options={items.map((table) => ({
          value: table.id,
          label: `${table.standard}, ${table.series}, ${material(table.material)}`,
        }))}
        onChange={(tableId) => {
          const rows = items.find(({ id }) => id === tableId)?.rows ?? [];
          const kept = rows.some(({ dn }) => dn === values.dn);
          onChange({ tableId, ...(kept ? {} : { dn: null }) });
        }}
        error={pointErrorOf(props, "tableId")}
        required
      />
      <SelectField
        label={t("pipe.dn")}
        hint={chosen ? t("pipe.dnHint") : t("pipe.dnFirst")}
        value={values.dn === null ? null : String(values.dn)}
        options={(chosen?.rows ?? []).map((row) => ({
          value: String(row.dn),
          label: t("pipe.dnOption", {
            dn: row.dn,
            outside: size(row.outsideDiameterMm),
            wall: size(row.wallMm),
            unit: format.unit("pipeSize").unit,
          }),
        }))}
        onChange={(dn) => onChange({ dn: Number(dn) })}
        disabled={chosen === undefined}
        error={pointErrorOf(props, "dn")}
        required
      />
    </FieldRow>
  );
}

function MeasuredFields(props: PointFormProps) {
  const t = useWords("places");
  const { values, onChange, onReadable, format } = props;
  const unit = format.unit("pipeSize").unit;
  const number = (field: "outsideDiameter" | "wall" | "lining") => ({
    unit,
    value: values[field],
    error: pointErrorOf(props, field),
    onChange: (value: number | null, readable: boolean) => {
      onChange({ [field]: value });
      onReadable(field, readable);
    },
  });
  return (
    <>
      <FieldRow>
        <NumberField
          label={t("pipe.outside")}
          hint={t("pipe.outsideHint")}
          {...number("outsideDiameter")}
          {...shownRange(format, "pipeSize", 15, 1300)}
          required
        />
        <NumberField
          label={t("pipe.wall")}
          hint={t("pipe.wallHint")}
          {...number("wall")}
          {...shownRange(format, "pipeSize", 0.5, 40)}
          required
        />
        <NumberField
          label={t("pipe.lining")}
          hint={t("pipe.liningHint")}
          {...number("lining")}
          {...shownRange(format, "pipeSize", 0, 25)}
        />
      </FieldRow>
      <TextField
        label={t("pipe.material")}
        hint={t("pipe.materialHint")}
        value={values.material}
        onChange={(material) => onChange({ material })}
        error={pointErrorOf(props, "material")}
        autoComplete="off"
      />
    </>
  );
}

function PipeResult(props: PointFormProps) {
  const t = useWords("places");
  const { values, point, format, loop } = props;
  const boreText = useBoreText(format.unitSystem);
  const resolved = resolvedPipe(pipeOf(values, point, format));
  const dimensions = resolved?.ok ? resolved.dimensions : null;
  const bore = dimensions?.insideDiameterMm ?? null;
  const text = bore === null ? null : boreText(bore);
  const unit = format.unit("pipeSize").unit;
  const said =
    dimensions === null
      ? t("pipe.saidNone")
      : t("pipe.said", {
          bore: format.withUnit(dimensions.insideDiameterMm, "pipeSize", 2),
          wall: format.withUnit(dimensions.wallMm, "pipeSize", 2),
          outside: format.withUnit(dimensions.outsideDiameterMm, "pipeSize", 2),
        });
  const share = dimensions && dimensions.wallMm / dimensions.outsideDiameterMm;
  const oddWall =
    values.pipeKind === "measured" &&
    share !== null &&
    (share < usualWallShare.least || share > usualWallShare.most);
  const speed =
    bore === null || loop.designFlowM3PerHour === null
      ? null
      : velocityMPerS(loop.designFlowM3PerHour, bore);
  const oddSpeed = speed !== null && (speed < goodSpeedMPerS.least || speed > goodSpeedMPerS.most);
  return (
    <View style={{ gap: 12 }}>
      <View style={{ flexDirection: "row", gap: 20, alignItems: "center", flexWrap: "wrap" }}>
        <PipeSection
          pipe={dimensions}
          label={said}
          bore={text}
          service={loop.service === "changeover" ? null : serviceOf(loop.service)}
          sensors
        />
        <View style={{ flex: 1, minWidth: 200 }}>
          <WorkedOutField
            label={t("pipe.bore")}
            value={bore === null ? null : format.number(format.toDisplay(bore, "pipeSize"), 2)}
            unit={unit}
            hint={t("pipe.boreHint")}
          />
          {speed === null ? null : (
            <Text variant="small" tone="ink2" style={{ marginTop: 6 }}>
              {t("pipe.speed", {
                flow: format.withUnit(loop.designFlowM3PerHour, "flow", 1),
                speed: format.withUnit(speed, "velocity", 2),
              })}
            </Text>
          )}
        </View>
      </View>
      {oddWall ? <SoftWarning>{t("pipe.wallOdd")}</SoftWarning> : null}
      {oddSpeed ? (
        <SoftWarning>
          {t("pipe.speedOdd", {
            low: format.number(format.toDisplay(goodSpeedMPerS.least, "velocity"), 1),
            high: format.withUnit(goodSpeedMPerS.most, "velocity", 1),
          })}
        </SoftWarning>
      ) : null}
    </View>
  );
}

function serviceOf(service: "chilled" | "hot"): "cooling" | "heating" {
  return tagService(service) === "heating" ? "heating" : "cooling";
}
