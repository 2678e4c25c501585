/** A component as the linter's plain TypeScript program sees it; vue-tsc reads the real files instead. */
declare module '*.vue' {
  import type { DefineComponent } from 'vue';
  const component: DefineComponent<object, object, unknown>;
  export default component;
}
