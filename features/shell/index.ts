export { CrashScreen, NotFoundScreen } from "./lost-screens";
export { RootLayout } from "./root-layout";
export { SignedInLayout } from "./signed-in-layout";
