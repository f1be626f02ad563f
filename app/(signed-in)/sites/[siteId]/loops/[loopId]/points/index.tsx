export { PointsScreen as default } from "@features/places/points-screen";
