import { watchEffect } from 'vue';
import { useTrailStore, type Crumb } from '../stores/trail';

export interface PageHead {
  /** Title of the browser tab before "Heddle"; tells the state of a run where there is one. */
  readonly title: string;
  readonly crumbs: readonly Crumb[];
}

/** Keeps tab title and breadcrumb as the page's state says. */
export function usePageHead(head: () => PageHead): void {
  const trail = useTrailStore();
  watchEffect(() => {
    const { title, crumbs } = head();
    document.title = title === '' ? 'Heddle' : `${title} · Heddle`;
    trail.crumbs = crumbs;
  });
}
