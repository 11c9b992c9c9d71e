/** Put in by the build (vite.config.ts). */
declare const __APP_VERSION__: string;
/** Short commit, or "unknown" outside a git checkout. */
declare const __APP_COMMIT__: string;
