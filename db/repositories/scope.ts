/** Who asks, and in which workspace: every call on behalf of a person carries both. */
export interface Scope {
  readonly userId: string;
  readonly workspaceId: string;
}
