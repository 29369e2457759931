/** From package.json, put in by the build. */
declare const __APP_VERSION__: string;
