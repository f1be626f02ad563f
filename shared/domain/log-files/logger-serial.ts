/** Labels of a serial number as loggers write them, in the languages their software is sold in. */
const LABEL =
  /(^|[\s._-])(serial( number| no\.?)?|serien-?(nummer|nr\.?)|s\/?n|sn|num[eé]ro de s[eé]rie|n° de s[eé]rie|matricola|n[uú]mero de serie)($|[\s.:#_-])/i;
/** Serials of a probe or meter stand beside the logger's, and name themselves. */
const OF_ANOTHER = /probe|sensor|f[uü]hler|sonde|transducer/i;
const SERIAL = /^[\p{L}\p{N}][\p{L}\p{N}./_-]{1,59}$/u;

/**
 * The serial number of the logger or meter that wrote a file, where a line above the header names
 * one; null where none does. Example: `Serial number: LG-0712` gives `LG-0712`.
 */
export function loggerSerial(
  preamble: readonly { readonly label: string; readonly value: string }[],
): string | null {
  for (const { label, value } of preamble) {
    const text = value.trim();
    if (LABEL.test(label.trim()) && !OF_ANOTHER.test(label) && SERIAL.test(text)) return text;
  }
  return null;
}
