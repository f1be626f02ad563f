export { InstrumentScreen as default } from "@features/kit/instrument-screen";
