export { LoopScreen as default } from "@features/loops/loop-screen";
