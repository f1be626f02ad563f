export { EditLoopScreen as default } from "@features/places/loop-form-screen";
