import type { ReactNode } from "react";
import { View } from "react-native";

import { Figure, Text, type FigureProps, type ShownValue } from "@features/ui";

/** A worked-out figure under its name, with words beneath that say what it stands on. */
export function LoadFigure(props: {
  title: string;
  figure: ShownValue;
  size?: FigureProps["size"];
  /** What opens the figure's workings, where it has any. */
  workings?: Pick<FigureProps, "onOpenWorkings" | "workingsOpen">;
  children?: ReactNode;
}) {
  return (
    <View style={{ flexGrow: 1, flexBasis: 150, minWidth: 130, gap: 2 }}>
      <Text variant="small" tone="ink3" hidden>
        {props.title}
      </Text>
      <Figure
        {...props.figure}
        said={props.title}
        size={props.size ?? "m"}
        {...(props.figure.value === null ? {} : props.workings)}
      />
      {typeof props.children === "string" ? (
        <Text variant="small" tone="ink2">
          {props.children}
        </Text>
      ) : (
        props.children
      )}
    </View>
  );
}

/** Hours as people say them: “22 h”, “5.5 h”, and minutes below one. */
export function useHours(format: {
  number: (value: number, places?: number) => string;
  duration: (seconds: number) => string;
}) {
  return (hours: number): string => {
    if (hours > 0 && hours < 1) return format.duration(hours * 3600);
    const places = hours < 100 && Math.abs(hours - Math.round(hours)) > 0.05 ? 1 : 0;
    return `${format.number(hours, places)}\u00A0h`;
  };
}
