export { SiteScreen as default } from "@features/places/site-screen";
