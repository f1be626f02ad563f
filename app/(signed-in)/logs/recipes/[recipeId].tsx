export { RecipeScreen as default } from "@features/imports/recipes/recipe-screen";
