import { webStyle, type Colours } from "./theme";

const squarePx = 16;

/** Engineers’ computation paper: the ground of workings and of nothing else. */
export function squaredPaper({ padGrid }: Pick<Colours, "padGrid">) {
  return webStyle({
    backgroundImage: `linear-gradient(${padGrid} 1px, transparent 1px), linear-gradient(90deg, ${padGrid} 1px, transparent 1px)`,
    backgroundSize: `${squarePx}px ${squarePx}px`,
    backgroundPosition: "-1px -1px",
  });
}
