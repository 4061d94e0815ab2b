import type { ImportDraft } from '#contract/imports';
import { useAction } from './useAction';
import { usePolling } from './usePolling';
import { useImportsStore } from '../stores/imports';

/** Looks at an import again until a worker has counted its cliques. */
export function useEstimate(props: { readonly workspaceId: string; readonly draft: ImportDraft }) {
  const imports = useImportsStore();
  const look = useAction(() => imports.load(props.workspaceId, props.draft.id));
  usePolling(() => props.draft.estimate.state === 'waiting', look.run);
  return look.problem;
}
