export { default as WorksheetPage } from './WorksheetPage.svelte';
