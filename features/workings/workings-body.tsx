import { View } from "react-native";

import type { Workings } from "@shared/contracts/workings";
import { localDateOf } from "@shared/domain/time/local-calendar";
import { quantityOf } from "@shared/workings/shown-quantity";
import { workingsText, type Line, type WorkingsText } from "@shared/workings/workings-text";
import { useFormat, useWords, type Format } from "@features/i18n";
import {
  Figure,
  Formula,
  FormulaSymbol,
  Inline,
  Mark,
  Strong,
  Text,
  TextLink,
  type MarkKind,
} from "@features/ui";

import { RowBar } from "./row-bar";
import { BudgetRows } from "./workings-budget";
import { behindPaths } from "./workings-paths";
import { Ruled, WorkingsSection } from "./workings-section";

/** The workings of one figure, from the formula down to its rows. */
export function WorkingsBody({ model, large }: { model: Workings; large: boolean }) {
  const t = useWords("workings");
  const { subject } = model;
  const format = useFormat(subject.zone, subject.unitSystem);
  const text = workingsText(model, (key, values) => String(t(key, values ?? {})), format);
  return (
    <View>
      <Text variant="small" tone="ink2">
        {text.subject}
      </Text>
      <ShownFigure model={model} format={format} large={large} />
      <Formula lines={text.formula} said={text.formulaSaid} />
      {text.byHand ? <ByHand byHand={text.byHand} /> : null}
      <Cautions text={text} />
      <Inputs text={text} />
      {text.budget ? (
        <WorkingsSection title={text.budget.title}>
          <BudgetRows budget={text.budget} />
        </WorkingsSection>
      ) : null}
      <Rows model={model} text={text} />
      <Behind model={model} text={text} />
      <WorkingsSection title={text.basis.title}>
        {text.basis.rows.map(({ label, value }) => (
          <Pair key={label} label={label} value={value} />
        ))}
      </WorkingsSection>
      {text.formulasFrom.rows.length > 0 ? (
        <WorkingsSection title={text.formulasFrom.title}>
          {text.formulasFrom.rows.map(({ name, forWhat }) => (
            <Pair key={`${name} ${forWhat}`} label={name} value={forWhat} />
          ))}
        </WorkingsSection>
      ) : null}
    </View>
  );
}

function ShownFigure(props: { model: Workings; format: Format; large: boolean }) {
  const { model, format } = props;
  const quantity = quantityOf(model);
  const unit = quantity ? format.unit(quantity) : null;
  const shown = (stored: number) => (quantity ? format.toDisplay(stored, quantity) : stored);
  const expanded = model.plusMinus?.expanded ?? null;
  return (
    <Figure
      value={model.value === null ? null : shown(model.value)}
      unit={unit?.unit ?? model.unit}
      uncertainty={expanded === null || unit === null ? expanded : expanded * unit.factor}
      size={props.large ? "xl" : "l"}
      {...(model.figure === "completeness" ? { places: 1 } : {})}
      {...(model.figure === "deltaT" ? { places: 2 } : {})}
    />
  );
}

function ByHand({ byHand }: { byHand: NonNullable<WorkingsText["byHand"]> }) {
  return (
    <View style={{ marginTop: 4 }}>
      <Text variant="table">
        <Inline variant="table" tone="ink3">
          {byHand.label}
          {"  "}
        </Inline>
        {byHand.sum}
      </Text>
      {byHand.note === "" ? null : (
        <Text variant="small" tone="ink3">
          {byHand.note}
        </Text>
      )}
    </View>
  );
}

const stops = ["energyBlocked", "nothingCovered", "stopVerdict"];
const notes = ["pressureAssumed", "countedNoUncertainty", "recalculating", "partlyDefaults"];

function markOf(code: string): MarkKind {
  if (stops.includes(code)) return "wrong";
  return notes.includes(code) ? "note" : "look";
}

function Cautions({ text: { cautions } }: { text: WorkingsText }) {
  if (cautions.rows.length === 0) return null;
  return (
    <WorkingsSection title={cautions.title}>
      <View role="list" aria-label={cautions.title} style={{ gap: 6 }}>
        {cautions.rows.map(({ code, text }) => (
          <View key={code} role="listitem" style={{ flexDirection: "row", gap: 8 }}>
            <Mark kind={markOf(code)} size={18} />
            <View style={{ flex: 1, minWidth: 0 }}>
              <Text variant="small" tone="ink2">
                {text}
              </Text>
            </View>
          </View>
        ))}
      </View>
    </WorkingsSection>
  );
}

function Inputs({ text: { inputs } }: { text: WorkingsText }) {
  if (inputs.rows.length === 0) return null;
  return (
    <WorkingsSection title={inputs.title}>
      <View role="list" aria-label={inputs.title}>
        {inputs.rows.map((row) => (
          <Ruled key={row.key} role="listitem">
            <View aria-hidden style={{ width: 26 }}>
              <FormulaSymbol piece={row.symbol} />
            </View>
            <View style={{ flex: 1, minWidth: 0 }}>
              <Text variant="bodyWide">
                {row.label}{" "}
                <Inline variant="unit" tone="ink3">
                  {row.detail}
                </Inline>
              </Text>
            </View>
            <Text variant={row.asRead ? "asReadM" : "figureS"}>
              {row.value}{" "}
              <Inline variant="unit" tone="ink3">
                {row.unit}
              </Inline>
            </Text>
          </Ruled>
        ))}
      </View>
    </WorkingsSection>
  );
}

function Rows({ model, text }: { model: Workings; text: WorkingsText }) {
  const t = useWords("workings");
  const { rows } = text;
  const { loopId, pointId, zone } = model.subject;
  const first = localDateOf(Date.parse(model.from), zone);
  const last = localDateOf(Date.parse(model.to) - 1, zone);
  return (
    <WorkingsSection title={rows.title}>
      <RowBar rows={model.rows} label={rows.sentence} />
      <Text variant="small" tone="ink2" style={{ marginTop: 6 }}>
        {rows.sentence}
      </Text>
      {rows.covered === null ? null : (
        <Text variant="small" tone="ink2">
          {rows.covered}
        </Text>
      )}
      <TextLink
        variant="small"
        label={t("rows.open")}
        href={behindPaths.rows(loopId, pointId, first, last)}
      />
    </WorkingsSection>
  );
}

/** Who measured how, what was changed, and the files as they came. */
function Behind({ model, text }: { model: Workings; text: WorkingsText }) {
  const t = useWords("workings");
  const { siteId, loopId, pointId } = model.subject;
  return (
    <>
      <WorkingsSection title={text.installations.title}>
        {text.installations.none === null ? null : (
          <Text variant="small" tone="ink2">
            {text.installations.none}
          </Text>
        )}
        <Lines rows={text.installations.rows} />
        <TextLink
          variant="small"
          label={t("evidence.open")}
          href={behindPaths.evidence(siteId, loopId, pointId)}
        />
      </WorkingsSection>
      {text.corrections.rows.length > 0 ? (
        <WorkingsSection title={text.corrections.title}>
          <Lines rows={text.corrections.rows} />
          <TextLink
            variant="small"
            label={t("corrections.open")}
            href={behindPaths.corrections(siteId, loopId, pointId)}
          />
        </WorkingsSection>
      ) : null}
      {text.fills.rows.length > 0 ? (
        <WorkingsSection title={text.fills.title}>
          <Lines rows={text.fills.rows} />
          <Text variant="small" tone="ink2">
            {text.fills.note}
          </Text>
        </WorkingsSection>
      ) : null}
      {text.files.rows.length > 0 ? (
        <WorkingsSection title={text.files.title}>
          {text.files.rows.map(({ key, lead, detail, hash }) => (
            <Ruled key={key}>
              <View style={{ flex: 1, minWidth: 0 }}>
                <Text variant="small">
                  <Strong>{lead}</Strong> {detail}
                </Text>
                <Text variant="asReadS" tone="ink3" numberOfLines={1}>
                  {hash}
                </Text>
              </View>
            </Ruled>
          ))}
        </WorkingsSection>
      ) : null}
    </>
  );
}

function Lines({ rows }: { rows: readonly Line[] }) {
  return rows.map(({ key, lead, detail }) => (
    <Ruled key={key}>
      <View style={{ flex: 1, minWidth: 0 }}>
        <Text variant="small">
          <Strong>{lead}</Strong>
        </Text>
        <Text variant="small" tone="ink2">
          {detail}
        </Text>
      </View>
    </Ruled>
  ));
}

function Pair({ label, value }: { label: string; value: string }) {
  return (
    <View style={{ flexDirection: "row", justifyContent: "space-between", gap: 12 }}>
      <Text variant="table" tone="ink2">
        {label}
      </Text>
      <View style={{ flexShrink: 1 }}>
        <Text variant="table" tone="ink2" align="right">
          {value}
        </Text>
      </View>
    </View>
  );
}
