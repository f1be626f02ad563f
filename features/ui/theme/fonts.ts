/**
 * Font stacks by weight. Each weight is its own file and family name, so a browser never fakes one.
 * Archivo Narrow has no Δ and Spline Sans Mono has no Δ, Σ or arrows: the stacks fall through to
 * Archivo, which has them.
 */
function stack(first: string, archivo: string): string {
  return `${first}, ${archivo}, system-ui, sans-serif`;
}

export const font = {
  ui: {
    regular: "Archivo_400Regular, system-ui, sans-serif",
    medium: "Archivo_500Medium, system-ui, sans-serif",
    semibold: "Archivo_600SemiBold, system-ui, sans-serif",
    bold: "Archivo_700Bold, system-ui, sans-serif",
  },
  narrow: {
    medium: stack("ArchivoNarrow_500Medium", "Archivo_500Medium"),
    semibold: stack("ArchivoNarrow_600SemiBold", "Archivo_600SemiBold"),
  },
  mono: {
    regular: stack("SplineSansMono_400Regular", "Archivo_400Regular"),
    medium: stack("SplineSansMono_500Medium", "Archivo_500Medium"),
  },
  formula: {
    regular: "STIXTwoText_400Regular, serif",
    italic: "STIXTwoText_400Regular_Italic, serif",
  },
} as const;
