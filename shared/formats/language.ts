/** Languages people read Loopwright in, on screens and on paper. */
export type Language = "en" | "de";
