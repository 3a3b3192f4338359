/** A worker bundled as one classic script, as text; made by the build and by the test server. */
declare module 'inline-worker:*' {
  const source: string;
  export default source;
}
