import type { TFunction } from "i18next";
import { useTranslation } from "react-i18next";

import { i18nInstance } from "./i18n";
import type { Namespace } from "./resources";

/** The words of one feature: `const t = useWords("imports")`, then `t("file.title", { rows })`. */
export function useWords(namespace: Namespace): TFunction {
  return useTranslation(namespace, { i18n: i18nInstance }).t;
}
