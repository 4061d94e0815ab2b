import type { RouteRecordRaw } from 'vue-router';

declare module 'vue-router' {
  interface RouteMeta {
    /** For people without a session only (sign in, sign up). */
    visitor?: boolean;
    /** Needs no session. */
    open?: boolean;
    /** Uses the whole window instead of a sheet. */
    wide?: boolean;
  }
}

/** The site map. */
export const routes: RouteRecordRaw[] = [
  {
    path: '/',
    component: () => import('../layouts/MainLayout.vue'),
    children: [
      { path: '', name: 'home', component: () => import('../pages/HomePage.vue') },
      {
        path: 'sign-in',
        name: 'sign-in',
        meta: { visitor: true },
        component: () => import('../pages/SignInPage.vue'),
      },
      {
        path: 'sign-up',
        name: 'sign-up',
        meta: { visitor: true },
        component: () => import('../pages/SignUpPage.vue'),
      },
      {
        path: 'workspaces/:workspaceId',
        name: 'workspace',
        props: true,
        component: () => import('../pages/WorkspacePage.vue'),
      },
      {
        path: 'workspaces/:workspaceId/datasets/new',
        name: 'dataset-new',
        props: true,
        component: () => import('../pages/DatasetUploadPage.vue'),
      },
      {
        path: 'workspaces/:workspaceId/datasets/:datasetId',
        name: 'dataset',
        props: true,
        component: () => import('../pages/DatasetPage.vue'),
      },
      {
        path: 'workspaces/:workspaceId/datasets/:datasetId/revisions/new',
        name: 'revision-new',
        props: true,
        component: () => import('../pages/DatasetUploadPage.vue'),
      },
      {
        path: 'workspaces/:workspaceId/imports/new',
        name: 'import-new',
        props: true,
        component: () => import('../pages/ImportBeginPage.vue'),
      },
      {
        path: 'workspaces/:workspaceId/datasets/:datasetId/imports/new',
        name: 'import-revision',
        props: true,
        component: () => import('../pages/ImportBeginPage.vue'),
      },
      {
        path: 'workspaces/:workspaceId/models/new',
        name: 'model-new',
        props: true,
        component: () => import('../pages/GrowPage.vue'),
      },
      {
        path: 'workspaces/:workspaceId/imports/:importId/:step',
        name: 'import',
        props: true,
        component: () => import('../pages/ImportPage.vue'),
      },
      {
        path: 'workspaces/:workspaceId/runs/:runId',
        name: 'run',
        props: true,
        meta: { wide: true },
        component: () => import('../pages/BenchPage.vue'),
      },
      {
        path: ':path(.*)*',
        name: 'not-found',
        meta: { open: true },
        component: () => import('../pages/NotFoundPage.vue'),
      },
    ],
  },
];
