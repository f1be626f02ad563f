export { ComparisonScreen as default } from "@features/compare/comparison-screen";
