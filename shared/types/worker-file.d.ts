// Made by modules/fit-worker.ts: the module becomes an entry of its own, and the import gives its file URL once asked.
declare module '*?worker-file' {
  const fileUrl: () => string
  export default fileUrl
}
