export { LoopsScreen as default } from "@features/places/loops-screen";
