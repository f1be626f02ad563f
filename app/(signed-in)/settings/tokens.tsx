export { TokensScreen as default } from "@features/people/tokens-screen";
