import { defineRouter } from '#q-app/wrappers';
import { createRouter, createWebHistory } from 'vue-router';
import { guard } from './guard';
import { routes } from './routes';

export default defineRouter(() => {
  const router = createRouter({
    history: createWebHistory('/'),
    routes,
    // A change of the query alone (a selection on the bench) leaves the page where it is.
    scrollBehavior: (to, from, saved) =>
      to.path === from.path ? false : (saved ?? (to.hash ? { el: to.hash } : { top: 0 })),
  });
  router.beforeEach(guard);
  return router;
});
