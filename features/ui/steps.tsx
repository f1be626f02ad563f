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

/** A round with its steps on the line. Wide: numbered labels; phone: joints, the title below. */
export function Steps<Key extends string>(props: StepsProps<Key>) {
  const phone = useBreakpoint() === "phone";
  return phone ? <JointSteps {...props} /> : <LabelledSteps {...props} />;
}

function LabelledSteps<Key extends string>(props: StepsProps<Key>) {
  const { colour } = useTheme();
  const [width, onLayout] = useMeasuredWidth();
  const { spans, measure } = useSpans("x");
  const height = 50;
  const span = spans.get(props.current);
  const run =
    span && width > 0
      ? risingRun({ start: span.start + 8, end: span.end - 8 }, width, height - 8)
      : null;
  const currentIndex = props.steps.findIndex(({ key }) => key === props.current);
  return (
    <View role="group" aria-label={props.label} onLayout={onLayout} style={{ minHeight: height }}>
      {run ? (
        <View aria-hidden style={{ position: "absolute", left: 0, right: 0, top: 0, height }}>
          <Svg width={width} height={height}>
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
        {props.steps.map((step, index) => (
          <View
            key={step.key}
            role="listitem"
            onLayout={measure(step.key)}
            style={{ minHeight: height, flexGrow: 1, alignItems: "center" }}
          >
            <StepButton {...props} step={step} index={index}>
              <Text
                variant={index === currentIndex ? "navOn" : "nav"}
                tone={index <= currentIndex || step.done ? "ink" : "ink2"}
              >
                {`${index + 1}\u2002${step.label}`}
              </Text>
            </StepButton>
            {index === currentIndex ? null : (
              <View aria-hidden style={{ position: "absolute", top: height - 17 }}>
                <Joint done={step.done} ground={colour.pad} />
              </View>
            )}
          </View>
        ))}
      </View>
    </View>
  );
}

function JointSteps<Key extends string>(props: StepsProps<Key>) {
  const { colour } = useTheme();
  const t = useWords("ui");
  const [width, onLayout] = useMeasuredWidth();
  const count = props.steps.length;
  const currentIndex = Math.max(
    0,
    props.steps.findIndex(({ key }) => key === props.current),
  );
  const current = props.steps[currentIndex];
  const at = (index: number) => 12 + (index * Math.max(0, width - 24)) / Math.max(1, count - 1);
  return (
    <View role="group" aria-label={props.label}>
      <View onLayout={onLayout} style={{ height: target.default }}>
        {width > 0 ? (
          <View aria-hidden style={{ position: "absolute", inset: 0 }}>
            <Svg width={width} height={target.default}>
              <Path d={`M0 24H${at(currentIndex)}`} stroke={colour.ink} strokeWidth={stroke.run} />
              <Path
                d={`M${at(currentIndex)} 24H${width}`}
                stroke={colour.ruleStrong}
                strokeWidth={stroke.run}
                strokeDasharray="2 6"
                strokeLinecap="round"
              />
            </Svg>
          </View>
        ) : null}
        <View
          role="list"
          style={{ flexDirection: "row", justifyContent: "space-between", marginHorizontal: -12 }}
        >
          {props.steps.map((step, index) => (
            <View key={step.key} role="listitem">
              <StepButton {...props} step={step} index={index}>
                <View
                  style={{
                    width: target.default,
                    height: target.default,
                    alignItems: "center",
                    justifyContent: "center",
                  }}
                >
                  <Joint done={step.done} current={index === currentIndex} ground={colour.pad} />
                </View>
              </StepButton>
            </View>
          ))}
        </View>
      </View>
      <Text variant="title" level={2}>
        {current?.label ?? ""}
      </Text>
      <Text variant="small" tone="ink3">
        {t("steps.ofAll", { step: currentIndex + 1, count })}
      </Text>
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
      style={{ minHeight: 34, justifyContent: "center", paddingHorizontal: 6 }}
    >
      {props.children}
    </Pressable>
  );
}

function Joint({ done, current, ground }: { done: boolean; current?: boolean; ground: string }) {
  const { colour } = useTheme();
  if (done && !current) {
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
    <Svg width={22} height={22}>
      <Circle
        cx={11}
        cy={11}
        r={current ? 9 : 5.5}
        fill={ground}
        stroke={current ? colour.ink : colour.ruleStrong}
        strokeWidth={current ? 3 : 2}
      />
      {current ? <Circle cx={11} cy={11} r={4} fill={colour.ink} /> : null}
    </Svg>
  );
}
