import { useFonts } from "expo-font";

import archivoRegular from "@assets/fonts/Archivo_400Regular.ttf";
import archivoMedium from "@assets/fonts/Archivo_500Medium.ttf";
import archivoSemibold from "@assets/fonts/Archivo_600SemiBold.ttf";
import archivoBold from "@assets/fonts/Archivo_700Bold.ttf";
import narrowMedium from "@assets/fonts/ArchivoNarrow_500Medium.ttf";
import narrowSemibold from "@assets/fonts/ArchivoNarrow_600SemiBold.ttf";
import stix from "@assets/fonts/STIXTwoText_400Regular.ttf";
import stixItalic from "@assets/fonts/STIXTwoText_400Regular_Italic.ttf";
import monoRegular from "@assets/fonts/SplineSansMono_400Regular.ttf";
import monoMedium from "@assets/fonts/SplineSansMono_500Medium.ttf";

/** Starts loading the faces. Text shows in the fallback face until they arrive: nothing waits. */
export function useAppFonts(): boolean {
  const [loaded] = useFonts({
    Archivo_400Regular: archivoRegular,
    Archivo_500Medium: archivoMedium,
    Archivo_600SemiBold: archivoSemibold,
    Archivo_700Bold: archivoBold,
    ArchivoNarrow_500Medium: narrowMedium,
    ArchivoNarrow_600SemiBold: narrowSemibold,
    SplineSansMono_400Regular: monoRegular,
    SplineSansMono_500Medium: monoMedium,
    STIXTwoText_400Regular: stix,
    STIXTwoText_400Regular_Italic: stixItalic,
  });
  return loaded;
}
