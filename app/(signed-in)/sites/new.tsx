export { NewSiteScreen as default } from "@features/places/site-form-screen";
