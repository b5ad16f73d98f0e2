import type { PageRole } from '../utils/page-roles'

declare module '#app' {
  interface PageMeta {
    /** Roles of which one is enough to open the page; none means everybody signed in. */
    roles?: PageRole[]
  }
}

declare module 'vue-router' {
  interface RouteMeta {
    roles?: PageRole[]
  }
}

export {}
