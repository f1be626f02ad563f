export { NewInstrumentScreen as default } from "@features/kit/instrument-form-screen";
