export { NewPointScreen as default } from "@features/places/point-form-screen";
