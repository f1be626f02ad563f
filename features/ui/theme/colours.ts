/**
 * The only home of colour. Roles, not hues: a screen asks for what a colour means.
 * Every pair used reaches 4.5:1 for text and 3:1 for graphics in both themes.
 */
export interface Colours {
  /** Page ground. Green-grey of engineers’ computation paper. */
  readonly pad: string;
  /** Cards, tables, sheets, active navigation. */
  readonly sheet: string;
  /** Inset areas, table heads, disabled fills. */
  readonly well: string;
  /** Hairlines (decorative, not sole cue). */
  readonly rule: string;
  /** Field borders and control outlines. */
  readonly ruleStrong: string;
  /** Main text, primary button fill, the run line. */
  readonly ink: string;
  /** Secondary text. */
  readonly ink2: string;
  /** Captions, units, ± values. */
  readonly ink3: string;
  /** Text on ink. */
  readonly onInk: string;
  /** Neutral data marks: flow bars, earlier weeks. */
  readonly slate: string;
  /** Neutral data fills. */
  readonly slateTint: string;
  /** Cooling: text, supply line, tags. */
  readonly verdigris: string;
  /** Cooling: return line, chart marks. */
  readonly verdigrisMid: string;
  /** Cooling: ΔT band fill. */
  readonly verdigrisTint: string;
  /** Cooling: row and panel tint. */
  readonly verdigrisFaint: string;
  /** Text on verdigris. */
  readonly onVerdigris: string;
  /** Heating: text, supply line, tags. */
  readonly copper: string;
  /** Heating: return line, chart marks. */
  readonly copperMid: string;
  /** Heating: ΔT band fill. */
  readonly copperTint: string;
  /** Heating: row and panel tint. */
  readonly copperFaint: string;
  /** Text on copper. */
  readonly onCopper: string;
  /** Needs a look: text. */
  readonly brass: string;
  /** Needs a look: marks and hatch. */
  readonly brassMid: string;
  /** Needs a look: fill. */
  readonly brassTint: string;
  /** Needs a look: banner. */
  readonly brassFaint: string;
  /** Text on brass. */
  readonly onBrass: string;
  /** Wrong or stopped: text. */
  readonly madder: string;
  /** Wrong or stopped: marks. */
  readonly madderMid: string;
  /** Wrong or stopped: fill. */
  readonly madderTint: string;
  /** Wrong or stopped: banner. */
  readonly madderFaint: string;
  /** Text on madder. */
  readonly onMadder: string;
  /** Where you are: focus ring, selection, chart cursor, links. */
  readonly mark: string;
  /** Selected row, picked range. */
  readonly markTint: string;
  /** Text on mark. */
  readonly onMark: string;
  /** Grid lines of the Workings pad. */
  readonly padGrid: string;
  /** Behind sheets and dialogs. */
  readonly scrim: string;
}

export type ColourRole = keyof Colours;

export const lightColours: Colours = {
  pad: "#EFF2E9",
  sheet: "#FCFDF9",
  well: "#E5EADD",
  rule: "#CBD2C3",
  ruleStrong: "#7D8982",
  ink: "#0F1F2E",
  ink2: "#3F4E5A",
  ink3: "#56636C",
  onInk: "#FCFDF9",
  slate: "#6C7A83",
  slateTint: "#D9DFDD",
  verdigris: "#0F6459",
  verdigrisMid: "#3A8C80",
  verdigrisTint: "#BFDDD5",
  verdigrisFaint: "#E2F0EB",
  onVerdigris: "#FFFFFF",
  copper: "#8E420F",
  copperMid: "#BF6B33",
  copperTint: "#F0CDB1",
  copperFaint: "#FAEBDF",
  onCopper: "#FFFFFF",
  brass: "#6B5100",
  brassMid: "#A67C00",
  brassTint: "#F2DF9F",
  brassFaint: "#FBF3D8",
  onBrass: "#FFFFFF",
  madder: "#951B45",
  madderMid: "#C23B66",
  madderTint: "#F3CBD7",
  madderFaint: "#FBE9EE",
  onMadder: "#FFFFFF",
  mark: "#2A43B5",
  markTint: "#DBE1FA",
  onMark: "#FFFFFF",
  padGrid: "#E2E9DA",
  scrim: "rgba(15,31,46,0.55)",
};

/** The plant room theme: near-black, brighter metals. */
export const plantRoomColours: Colours = {
  pad: "#0A141B",
  sheet: "#111F28",
  well: "#0D1920",
  rule: "#2C404C",
  ruleStrong: "#6F858F",
  ink: "#F3F6EE",
  ink2: "#C3CED2",
  ink3: "#9AAAB1",
  onInk: "#0A141B",
  slate: "#8C9CA4",
  slateTint: "#2A3B45",
  verdigris: "#74D6C4",
  verdigrisMid: "#3F9C8D",
  verdigrisTint: "#1D4A45",
  verdigrisFaint: "#143331",
  onVerdigris: "#06201C",
  copper: "#F5A873",
  copperMid: "#C9773E",
  copperTint: "#57351F",
  copperFaint: "#38261B",
  onCopper: "#2A1202",
  brass: "#F0C75A",
  brassMid: "#C49A2B",
  brassTint: "#4B3B10",
  brassFaint: "#33290F",
  onBrass: "#241B00",
  madder: "#FF9DB4",
  madderMid: "#E0577F",
  madderTint: "#5A1F33",
  madderFaint: "#3C1824",
  onMadder: "#35000F",
  mark: "#A9B8FF",
  markTint: "#26336B",
  onMark: "#0B1440",
  padGrid: "#1A2A33",
  scrim: "rgba(3,8,12,0.7)",
};

/** Six steps of one hue for heat maps, faint to strong. */
export interface Ramp {
  readonly cooling: readonly string[];
  readonly heating: readonly string[];
}

export const lightRamp: Ramp = {
  cooling: ["#DBE9E3", "#B7D7CD", "#88BBAF", "#549A8C", "#29766A", "#0A4B43"],
  heating: ["#F7E6D6", "#EFCBAC", "#E0A478", "#C77C49", "#A05622", "#692D08"],
};

export const plantRoomRamp: Ramp = {
  cooling: ["#12262A", "#17403F", "#1F5F58", "#2F8477", "#58B3A3", "#A5EBDD"],
  heating: ["#2A1E19", "#4A2E1E", "#734524", "#A1632F", "#D68E54", "#FFCFA3"],
};
