export { AccessTokensScreen as default } from "@features/people/access-tokens-screen";
