/** Put in by the bundler (scripts/build.mjs) and by the test runners from package.json; absent where the sources run as they are. */
declare const __PLUMBTICK_VERSION__: string | undefined;

/** Version of Plumbtick that computed an answer, `major.minor.patch`; `unbuilt` when the sources run without a build. */
export const version: string = typeof __PLUMBTICK_VERSION__ === 'string' ? __PLUMBTICK_VERSION__ : 'unbuilt';
