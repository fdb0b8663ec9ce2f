import { ref } from 'vue'

/** What was pasted and not written in yet; outlives the dialog, not the page. */
export const pastedListing = ref('')
