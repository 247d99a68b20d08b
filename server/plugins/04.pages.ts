/** Pages show what their reader may see: no cache keeps them, neither the browser's nor one on the way. */
export default defineNitroPlugin((nitro) => {
  nitro.hooks.hook('render:response', (response) => {
    response.headers = { ...response.headers, 'cache-control': 'no-store' }
  })
})
