export { BathChecksScreen as default } from "@features/kit/bath-checks-screen";
