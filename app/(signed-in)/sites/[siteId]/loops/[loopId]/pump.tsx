export { PumpFormScreen as default } from "@features/places/pump-form-screen";
