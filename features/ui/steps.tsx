import { Pressable, View } from "react-native";
import Svg, { Circle, Path } from "react-native-svg";

import { useWords } from "@features/i18n";

import { risingRun } from "./run-line";
import { Text } from "./text";
import { stroke, target, useBreakpoint, useMeasuredWidth, useTheme } from "./theme";
import { useSpans } from "./use-spans";

export interface Step<Key extends string> {
  key: Key;
  label: string;
  done: boolean;
}

export interface StepsProps<Key extends string> {
  label: string;
  steps: readonly Step<Key>[];
  current: Key;
  /** Going back is always allowed; going on only as far as `reachable` (by default the done ones). */
  onChange?: (key: Key) => void;
  reachable?: (key: Key) => boolean;
}

/** A round with its steps on the line. Wide: numbered labels; phone: numbers only, the title below. */
export function Steps<Key extends string>(props: StepsProps<Key>) {
  const phone = useBreakpoint() === "phone";
  const t = useWords("ui");
  if (!phone) return <StepLine {...props} />;
  const index = Math.max(
    0,
    props.steps.findIndex(({ key }) => key === props.current),
  );
  return (
    <View>
      <StepLine {...props} short />
      <Text variant="title" level={2}>
        {props.steps[index]?.label ?? ""}
      </Text>
      <Text variant="small" tone="ink3">
        {t("steps.ofAll", { step: index + 1, count: props.steps.length })}
      </Text>
    </View>
  );
}

const LINE_HEIGHT = 50;
/** Where the line runs, from the top of the row. */
const FOOT = LINE_HEIGHT - 9.25;
const JOINT = 22;

function StepLine<Key extends string>(props: StepsProps<Key> & { short?: boolean }) {
  const { colour } = useTheme();
  const [width, onLayout] = useMeasuredWidth();
  const { spans, measure } = useSpans("x");
  const span = spans.get(props.current);
  const run =
    span && width > 0
      ? risingRun({ start: span.start + 8, end: span.end - 8 }, width, LINE_HEIGHT - 8)
      : null;
  const currentIndex = props.steps.findIndex(({ key }) => key === props.current);
  return (
    <View
      role="group"
      aria-label={props.label}
      onLayout={onLayout}
      style={{ minHeight: LINE_HEIGHT }}
    >
      {run ? (
        <View
          aria-hidden
          style={{ position: "absolute", left: 0, right: 0, top: 0, height: LINE_HEIGHT }}
        >
          <Svg width={width} height={LINE_HEIGHT}>
            <Path d={run.before} fill="none" stroke={colour.ink} strokeWidth={stroke.run} />
            <Path
              d={run.after}
              stroke={colour.ruleStrong}
              strokeWidth={stroke.run}
              strokeDasharray="2 6"
              strokeLinecap="round"
            />
          </Svg>
        </View>
      ) : null}
      <View role="list" style={{ flexDirection: "row", justifyContent: "space-between" }}>
        {props.steps.map((step, index) => {
          const current = index === currentIndex;
          const label = props.short
            ? current
              ? String(index + 1)
              : "\u2002"
            : `${index + 1}\u2002${step.label}`;
          return (
            <View
              key={step.key}
              role="listitem"
              onLayout={measure(step.key)}
              style={{ minHeight: LINE_HEIGHT, flexGrow: 1, alignItems: "center" }}
            >
              {current ? null : (
                <View
                  aria-hidden
                  style={{
                    position: "absolute",
                    top: FOOT - JOINT / 2,
                    height: JOINT,
                    justifyContent: "center",
                  }}
                >
                  <Joint done={step.done} ground={colour.pad} />
                </View>
              )}
              <StepButton {...props} step={step} index={index}>
                <Text
                  variant={current ? "navOn" : "nav"}
                  tone={index <= currentIndex || step.done ? "ink" : "ink2"}
                >
                  {label}
                </Text>
              </StepButton>
            </View>
          );
        })}
      </View>
    </View>
  );
}

function StepButton<Key extends string>(
  props: StepsProps<Key> & { step: Step<Key>; index: number; children: React.ReactNode },
) {
  const t = useWords("ui");
  const { step, index } = props;
  const isCurrent = step.key === props.current;
  const currentIndex = props.steps.findIndex(({ key }) => key === props.current);
  const open = props.reachable?.(step.key) ?? (index <= currentIndex || step.done);
  const said = t(step.done ? "steps.saidDone" : "steps.said", {
    step: index + 1,
    count: props.steps.length,
    label: step.label,
  });
  return (
    <Pressable
      role="button"
      aria-label={said}
      aria-current={isCurrent ? "step" : undefined}
      aria-disabled={!open || !props.onChange}
      tabIndex={open && props.onChange ? 0 : -1}
      onPress={() => {
        if (open && !isCurrent) props.onChange?.(step.key);
      }}
      style={{
        minHeight: target.default,
        justifyContent: "center",
        paddingHorizontal: 6,
        paddingBottom: 12,
      }}
    >
      {props.children}
    </Pressable>
  );
}

function Joint({ done, ground }: { done: boolean; ground: string }) {
  const { colour } = useTheme();
  if (done) {
    return (
      <Svg width={18} height={18}>
        <Circle cx={9} cy={9} r={7} fill={colour.ink} />
        <Path
          d="M6 9.300l2.200 2.200 4-4.600"
          fill="none"
          stroke={colour.onInk}
          strokeWidth={1.7}
          strokeLinecap="round"
          strokeLinejoin="round"
        />
      </Svg>
    );
  }
  return (
    <Svg width={JOINT} height={JOINT}>
      <Circle
        cx={JOINT / 2}
        cy={JOINT / 2}
        r={5.5}
        fill={ground}
        stroke={colour.ruleStrong}
        strokeWidth={2}
      />
    </Svg>
  );
}
