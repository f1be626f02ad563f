import type { Loop, Point, Site } from "@shared/contracts/places";
import { placesPaths } from "@features/places/places-paths";
import { useWords } from "@features/i18n";
import type { Crumb } from "@features/ui";
import { evidencePaths } from "./evidence-paths";

/** The way down to a point, and to its evidence where the page lies below it. */
export function usePointCrumbs(at: {
  site: Site | undefined;
  loop: Loop | undefined;
  point: Point | undefined;
  evidence?: boolean;
}): Crumb[] {
  const places = useWords("places");
  const t = useWords("installation");
  const { site, loop, point } = at;
  return [
    { label: places("sites.title"), href: placesPaths.sites },
    ...(site ? [{ label: site.name, href: placesPaths.site(site.id) }] : []),
    ...(site && loop
      ? [
          {
            label: places("points.of", { tag: loop.tag }),
            href: placesPaths.points(site.id, loop.id),
          },
        ]
      : []),
    ...(at.evidence && site && loop && point
      ? [
          {
            label: t("titleOf", { code: point.code }),
            href: evidencePaths.evidence(site.id, loop.id, point.id),
          },
        ]
      : []),
  ];
}
