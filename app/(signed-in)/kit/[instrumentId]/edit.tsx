export { EditInstrumentScreen as default } from "@features/kit/instrument-form-screen";
