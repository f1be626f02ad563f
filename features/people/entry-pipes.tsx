import { View } from "react-native";
import Svg, { Path, Rect } from "react-native-svg";

import { useTheme } from "@features/ui";

import type { PipesRoom } from "./pipes-room";

interface Box {
  width: number;
  height: number;
  room: PipesRoom;
}

/** The heating and the cooling loop around the form: behind it, and silent. */
export function EntryPipes(props: Box & { wide: boolean }) {
  return (
    <View aria-hidden style={{ position: "absolute", top: 0, left: 0, pointerEvents: "none" }}>
      <Svg width={props.width} height={props.height}>
        {props.wide ? <WidePipes {...props} /> : <PhonePipes {...props} />}
      </Svg>
    </View>
  );
}

/** On a phone the loops come down both sides and meet below the form. */
function PhonePipes({ width: w, height: h }: Box) {
  const { colour } = useTheme();
  const half = w / 2;
  const outer = { down: h - 66, foot: h - 22 };
  const inner = { down: h - 70, foot: h - 44 };
  const outerReturn = `M${half} ${outer.foot}H${w - 60}a44 44 0 0 0 44 -44V-10`;
  const innerReturn = `M${half} ${inner.foot}H${w - 62}a26 26 0 0 0 26 -26V-10`;
  return (
    <>
      <Pipe
        d={`M16 -10V${outer.down}a44 44 0 0 0 44 44H${half}`}
        stroke={colour.copper}
        width={13}
      />
      <Pipe
        d={outerReturn}
        stroke={colour.copperMid}
        width={13}
        core={colour.copperFaint}
        coreWidth={8.5}
      />
      <Pipe
        d={`M36 -10V${inner.down}a26 26 0 0 0 26 26H${half}`}
        stroke={colour.verdigris}
        width={9}
      />
      <Pipe
        d={innerReturn}
        stroke={colour.verdigrisMid}
        width={9}
        core={colour.verdigrisFaint}
        coreWidth={4.5}
      />
      <Rect x={half - 14.4} y={outer.foot - 14.4} width={28.8} height={28.8} fill={colour.pad} />
      <Path
        d={`M${half - 9} ${outer.foot - 8}L${half} ${outer.foot + 8}L${half + 9} ${outer.foot - 8}z`}
        fill={colour.copper}
      />
      <Rect x={half - 11.2} y={inner.foot - 11.2} width={22.4} height={22.4} fill={colour.pad} />
      <Path
        d={`M${half - 7} ${inner.foot + 6}L${half} ${inner.foot - 6}L${half + 7} ${inner.foot + 6}z`}
        fill={colour.verdigris}
      />
      <LevelFlange x={16} y={64} half={10} />
      <LevelFlange x={w - 16} y={64} half={10} />
      <LevelFlange x={36} y={92} half={8} />
      <LevelFlange x={w - 36} y={92} half={8} />
      <Path d={`M${w - 31.5} 330h8v11h-8zM${w - 31.5} 349h8v11h-8z`} fill={colour.ink} />
    </>
  );
}

/** On a desk they enter at the left, bend round the form and leave. */
function WidePipes({ width: w, height: h, room }: Box) {
  const { colour } = useTheme();
  const outer = { top: room.outer, right: w - 96, bottom: h - room.outer, mid: h / 2, r: 120 };
  const inner = { top: room.inner, right: w - 168, bottom: h - room.inner, mid: h / 2, r: 64 };
  const supply = (b: typeof outer) =>
    `M-10 ${b.top}H${b.right - b.r}a${b.r} ${b.r} 0 0 1 ${b.r} ${b.r}V${b.mid}`;
  const back = (b: typeof outer) =>
    `M${b.right} ${b.mid}V${b.bottom - b.r}a${b.r} ${b.r} 0 0 1 ${-b.r} ${b.r}H-10`;
  const chevron = {
    fill: "none",
    stroke: colour.sheet,
    strokeWidth: 3,
    strokeLinejoin: "round",
    strokeLinecap: "round",
  } as const;
  return (
    <>
      <Pipe d={supply(outer)} stroke={colour.copper} width={26} />
      <Pipe
        d={back(outer)}
        stroke={colour.copperMid}
        width={26}
        core={colour.copperFaint}
        coreWidth={19}
      />
      <Pipe d={supply(inner)} stroke={colour.verdigris} width={18} />
      <Pipe
        d={back(inner)}
        stroke={colour.verdigrisMid}
        width={18}
        core={colour.verdigrisFaint}
        coreWidth={11}
      />
      <Rect
        x={outer.right - 25.5}
        y={outer.mid - 27.2}
        width={51}
        height={54.4}
        fill={colour.pad}
      />
      <Path d={`M${outer.right - 15.3} ${outer.mid - 17}l30.6 17l-30.6 17z`} fill={colour.copper} />
      <Rect
        x={inner.right - 19.5}
        y={inner.mid - 20.8}
        width={39}
        height={41.6}
        fill={colour.pad}
      />
      <Path
        d={`M${inner.right + 11.7} ${inner.mid - 13}l-23.4 13l23.4 13z`}
        fill={colour.verdigris}
      />
      <UprightFlange x={123.5} y={outer.top} half={18} />
      <UprightFlange x={123.5} y={outer.bottom} half={18} />
      <UprightFlange x={209.5} y={inner.top} half={14} />
      <UprightFlange x={209.5} y={inner.bottom} half={14} />
      <Path
        d={`M520 ${inner.bottom - 18}h15v9h-15zM547 ${inner.bottom - 18}h15v9h-15z`}
        fill={colour.ink}
      />
      <Path
        d={`M620 ${outer.bottom - 22}h15v9h-15zM647 ${outer.bottom - 22}h15v9h-15z`}
        fill={colour.ink}
      />
      <Path d={`M760 ${outer.top - 8}l8 8l-8 8M782 ${outer.top - 8}l8 8l-8 8`} {...chevron} />
      <Path d={`M700 ${inner.top - 5}l6 5l-6 5M716 ${inner.top - 5}l6 5l-6 5`} {...chevron} />
    </>
  );
}

function Pipe(props: {
  d: string;
  stroke: string;
  width: number;
  core?: string;
  coreWidth?: number;
}) {
  return (
    <>
      <Path d={props.d} fill="none" stroke={props.stroke} strokeWidth={props.width} />
      {props.core ? (
        <Path d={props.d} fill="none" stroke={props.core} strokeWidth={props.coreWidth} />
      ) : null}
    </>
  );
}

/** A flange across an upright pipe. */
function LevelFlange({ x, y, half }: { x: number; y: number; half: number }) {
  const { colour } = useTheme();
  return (
    <>
      <Path
        d={`M${x - half} ${y}h${2 * half}M${x - half} ${y + 5}h${2 * half}`}
        stroke={colour.ink}
        strokeWidth={2.4}
      />
      <Rect x={x - half + 2.5} y={y + 1.2} width={2 * half - 5} height={2.6} fill={colour.pad} />
    </>
  );
}

/** A flange across a level pipe. */
function UprightFlange({ x, y, half }: { x: number; y: number; half: number }) {
  const { colour } = useTheme();
  return (
    <>
      <Path
        d={`M${x - 3.5} ${y - half}v${2 * half}M${x + 3.5} ${y - half}v${2 * half}`}
        stroke={colour.ink}
        strokeWidth={3}
      />
      <Rect x={x - 2} y={y - half + 4} width={4} height={2 * half - 8} fill={colour.pad} />
    </>
  );
}
