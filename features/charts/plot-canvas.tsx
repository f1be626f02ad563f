import { Canvas, DashPathEffect, Group, Path, rect, Shader } from "@shopify/react-native-skia";
import { useMemo } from "react";
import { Line } from "victory-native";

import { bandTexture, textureUniforms } from "./band-texture";
import type { BandColours, PlotCanvasProps } from "./plot-canvas-props";
import { bandPath, barsPath } from "./plot-paths";
import type { BandPoint, Direction, PlotPicture, PlotPoint } from "./plot-picture";

/** The curves, the band between them and the flow bars, on a transparent ground. */
export function PlotCanvas({ picture, colours, large }: PlotCanvasProps) {
  const { width, height } = picture;
  const clip = useMemo(() => rect(0, 0, width, height), [width, height]);
  const bars = useMemo(() => barsPath(picture.bars), [picture.bars]);
  return (
    <Canvas style={{ width, height }}>
      <Group clip={clip}>
        {(["cooling", "heating"] as const).map((direction) => (
          <Curves
            key={direction}
            picture={picture}
            direction={direction}
            colours={colours[direction]}
            large={large}
          />
        ))}
        <Path path={bars} color={colours.bars} />
      </Group>
    </Canvas>
  );
}

interface CurvesProps {
  picture: PlotPicture;
  direction: Direction;
  colours: BandColours;
  large: boolean;
}

function Curves({ picture, direction, colours, large }: CurvesProps) {
  const band = useMemo(() => bandPath(picture.band[direction]), [picture, direction]);
  const supply = useMemo(() => mutable(picture.supply[direction]), [picture, direction]);
  const back = useMemo(() => mutable(picture.return[direction]), [picture, direction]);
  const uniforms = useMemo(
    () => textureUniforms(direction, colours.fill, colours.supply),
    [direction, colours],
  );
  if (supply.length === 0) return null;
  return (
    <Group>
      <Path path={band} color={colours.fill}>
        {bandTexture && <Shader source={bandTexture} uniforms={uniforms} />}
      </Path>
      {picture.envelopes[direction].map((points, index) => (
        <Envelope key={index} points={points} colour={colours.return} />
      ))}
      <Line points={back} color={colours.return} strokeWidth={large ? 2.2 : 2} strokeJoin="round">
        <DashPathEffect intervals={large ? [7, 3.5] : [6, 3]} />
      </Line>
      <Line
        points={supply}
        color={colours.supply}
        strokeWidth={large ? 2.4 : 2.2}
        strokeJoin="round"
      />
    </Group>
  );
}

function Envelope({ points, colour }: { points: readonly BandPoint[]; colour: string }) {
  const path = useMemo(() => bandPath(points), [points]);
  return <Path path={path} color={colour} opacity={0.28} />;
}

/** The chart library's arrays are not marked read-only, though it only reads them. */
function mutable(points: readonly PlotPoint[]): PlotPoint[] {
  return points.some((point) => point.y !== null) ? [...points] : [];
}
