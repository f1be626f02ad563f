export { ComparisonFormScreen as default } from "@features/compare/comparison-form-screen";
