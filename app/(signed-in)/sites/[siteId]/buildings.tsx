export { BuildingsScreen as default } from "@features/places/buildings-screen";
