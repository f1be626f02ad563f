import { useInsertionEffect } from "react";

import { font } from "./fonts";
import { motion, stroke } from "./measures";
import type { Theme } from "./theme";

/**
 * What React Native for Web does not give: a visible focus ring everywhere, tabular figures, a
 * document that scrolls (so browsers restore scroll positions and phones fold their bars away), and
 * no motion for people who asked for none. A control that draws its own focus border sets
 * `data-own-focus`.
 */
function rules(theme: Theme): string {
  const { colour } = theme;
  return `
:root{--lw-mark:${colour.mark};color-scheme:${theme.name === "plantRoom" ? "dark" : "light"}}
/* What is tabbed to stays clear of the pinned buttons and the bar. */
html{scroll-padding-block:16px 168px}
html,body{height:auto;min-height:100%;margin:0;overflow:visible;background:${colour.pad};color:${colour.ink}}
body{font-family:${font.ui.regular};font-variant-numeric:tabular-nums;-webkit-font-smoothing:antialiased;-webkit-text-size-adjust:100%;overflow-x:hidden}
#root{display:flex;flex-direction:column;min-height:100vh;min-height:100dvh;height:auto}
:focus-visible{outline:${stroke.focus}px solid var(--lw-mark)!important;outline-offset:2px}
[data-own-focus]:focus-visible,[data-programmatic-focus]:focus-visible{outline:none!important}
button,input,select,textarea{font:inherit;color:inherit}
::placeholder{color:${colour.ink3};opacity:1}
svg{display:block}
@media (hover:hover){[role=button]:hover,[role=link]:hover,a:hover,label:hover{cursor:pointer}}
@media (prefers-reduced-motion:reduce){*,*::before,*::after{transition-duration:0s!important;animation-duration:0s!important;scroll-behavior:auto!important}}
.lw-line{transition:d ${motion.settle}ms ${motion.easing}}
`;
}

export function GlobalStyle({ theme }: { theme: Theme }): null {
  useInsertionEffect(() => {
    const element = document.createElement("style");
    element.setAttribute("data-loopwright", theme.name);
    element.textContent = rules(theme);
    document.head.appendChild(element);
    return () => element.remove();
  }, [theme]);
  return null;
}
