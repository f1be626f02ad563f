export { CorrectionsScreen as default } from "@features/corrections/corrections-screen";
