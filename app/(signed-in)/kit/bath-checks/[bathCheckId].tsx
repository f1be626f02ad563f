export { BathCheckScreen as default } from "@features/kit/bath-check-screen";
