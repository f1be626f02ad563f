export { EditSiteScreen as default } from "@features/places/site-form-screen";
