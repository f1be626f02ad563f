export { NewLoopScreen as default } from "@features/places/loop-form-screen";
