export { CrashScreen as ErrorBoundary, RootLayout as default } from "@features/shell";
