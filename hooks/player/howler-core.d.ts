/** howler without its 3D plugin, which no class needs: a few kilobytes less to send. */
declare module 'howler/dist/howler.core.min.js' {
  export { Howl, Howler } from 'howler'
}
