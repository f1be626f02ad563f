export { RecipesScreen as default } from "@features/imports/recipes/recipes-screen";
