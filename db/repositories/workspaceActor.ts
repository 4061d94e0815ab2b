/** Who acts, and in which workspace: the first argument of every call on a workspace's rows. */
export interface WorkspaceActor {
  readonly userId: string;
  readonly workspaceId: string;
}
