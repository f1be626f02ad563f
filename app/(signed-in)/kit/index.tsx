export { KitScreen as default } from "@features/kit/kit-screen";
