export { EditPointScreen as default } from "@features/places/point-form-screen";
