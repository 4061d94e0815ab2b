import { ref } from 'vue';
import { defineStore } from 'pinia';
import type { RouteLocationRaw } from 'vue-router';

/** One step of the breadcrumb: workspace, dataset, revision, run. */
export interface Crumb {
  readonly label: string;
  readonly to?: RouteLocationRaw;
}

/** Where the reader is; set by the page, shown by the header band. */
export const useTrailStore = defineStore('trail', () => {
  const crumbs = ref<readonly Crumb[]>([]);
  return { crumbs };
});
