export type { Colours, ColourRole, Ramp } from "./colours";
export { font } from "./fonts";
export {
  breakpoint,
  layout,
  motion,
  pipeStrokeByNominalSize,
  radius,
  space,
  stroke,
  target,
} from "./measures";
export {
  ThemeProvider,
  useTheme,
  useThemeChoice,
  type Theme,
  type ThemeChoice,
  type ThemeName,
} from "./theme";
export { typeScale, type TypeName } from "./type-scale";
export { useAppFonts } from "./use-app-fonts";
export { useBreakpoint, type Breakpoint } from "./use-breakpoint";
export { useMeasuredWidth } from "./use-measured-width";
export { webStyle } from "./web-style";
