export { BathCheckFormScreen as default } from "@features/kit/bath-check-form-screen";
