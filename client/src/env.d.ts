/// <reference types="vite/client" />
import type { Access } from './router/access'

declare module 'vue-router' {
  interface RouteMeta {
    access: Access
    /** Stands in the window's title and in the sheet's head until the view knows a better one. */
    title: string
    /** Sign-in and mail links lie on a single sheet without the frame. */
    layout?: 'plain'
  }
}
