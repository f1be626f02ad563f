import { Fragment } from "react";
import { View } from "react-native";
import Svg, { Path } from "react-native-svg";
import { hollowCore, serviceColours, Text, useTheme } from "@features/ui";
import { riserPipes, type Riser, type RiserSizes } from "./riser-geometry";

/** Chilled and hot risers beside the buildings: supply solid, return hollow. A drawing only. */
export function SiteRisers(props: {
  risers: readonly Riser[];
  width: number;
  height: number;
  sizes: RiserSizes;
}) {
  const { colour } = useTheme();
  const { risers, width, height, sizes } = props;
  const pipes = riserPipes(risers, width, sizes);
  return (
    <View aria-hidden style={{ position: "absolute", left: 0, top: 0, pointerEvents: "none" }}>
      <Svg width={width} height={height}>
        {pipes.map((pipe) => {
          const look = serviceColours(pipe.heating ? "heating" : "cooling", colour);
          return (
            <Fragment key={`${pipe.d} ${pipe.leg}`}>
              <Path
                d={pipe.haloD}
                fill="none"
                stroke={colour.pad}
                strokeWidth={pipe.width + sizes.halo}
              />
              <Path
                d={pipe.d}
                fill="none"
                stroke={pipe.leg === "supply" ? look.main : look.mid}
                strokeWidth={pipe.width}
              />
              {pipe.leg === "return" ? (
                <Path
                  d={pipe.d}
                  fill="none"
                  stroke={look.faint}
                  strokeWidth={hollowCore(pipe.width)}
                />
              ) : null}
            </Fragment>
          );
        })}
      </Svg>
    </View>
  );
}

/** What the two kinds of pipe on the risers mean. */
export function PipeKey(props: { supply: string; return: string }) {
  return (
    <View style={{ flexDirection: "row", gap: 16, alignItems: "center" }}>
      <KeyPart leg="supply" words={props.supply} />
      <KeyPart leg="return" words={props.return} />
    </View>
  );
}

function KeyPart({ leg, words }: { leg: "supply" | "return"; words: string }) {
  const { colour } = useTheme();
  return (
    <View style={{ flexDirection: "row", gap: 7, alignItems: "center" }}>
      <View aria-hidden>
        <Svg width={26} height={8}>
          <Path d="M0 4H26" stroke={colour.ink} strokeWidth={7} />
          {leg === "return" ? <Path d="M0 4H26" stroke={colour.pad} strokeWidth={4.2} /> : null}
        </Svg>
      </View>
      <Text variant="chip" tone="ink2">
        {words}
      </Text>
    </View>
  );
}
