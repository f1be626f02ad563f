export { EvidenceScreen as default } from "@features/evidence/evidence-screen";
