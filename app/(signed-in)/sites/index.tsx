export { SitesScreen as default } from "@features/places/sites-screen";
