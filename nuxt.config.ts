import { fileURLToPath } from 'node:url'

const inRoot = (path: string) => fileURLToPath(new URL(path, import.meta.url))

export default defineNuxtConfig({
  modules: ['@pinia/nuxt', '@nuxtjs/tailwindcss', '@sidebase/nuxt-auth', 'nuxt-security', '@nuxt/eslint', '@nuxt/test-utils/module'],
  components: [{ path: '~/components', pathPrefix: false }],
  devtools: { enabled: false },
  app: {
    head: {
      htmlAttrs: { lang: 'en' },
      title: 'Wideberth',
      meta: [{ name: 'viewport', content: 'width=device-width, initial-scale=1' }],
      link: [{ rel: 'icon', type: 'image/svg+xml', href: '/mark.svg' }],
    },
  },
  css: [
    '@fontsource/noto-sans/400.css', '@fontsource/noto-sans/600.css',
    '@fontsource/noto-sans/400-italic.css', '@fontsource/noto-sans/600-italic.css',
    '@fontsource/noto-sans-mono/400.css',
  ],
  // A second build folder lets a build for tests run beside the one that serves.
  buildDir: process.env.WIDEBERTH_BUILD_DIR || '.nuxt',
  compatibilityDate: '2026-11-01',
  nitro: {
    compressPublicAssets: true,
    // The engine's extended precision uses BigInt literals.
    esbuild: { options: { target: 'es2022' } },
    serverAssets: [
      { baseName: 'templates', dir: inRoot('./templates') },
      // what a report may embed; only the files of the styles it uses go into the build
      { baseName: 'noto-sans', dir: inRoot('./node_modules/@fontsource/noto-sans/files'), pattern: 'noto-sans-!(devanagari)-{400,600}-{normal,italic}.woff2' },
      { baseName: 'noto-sans-mono', dir: inRoot('./node_modules/@fontsource/noto-sans-mono/files'), pattern: 'noto-sans-mono-{latin,greek}-400-normal.woff2' },
      { baseName: 'noto-sans-math', dir: inRoot('./node_modules/@fontsource/noto-sans-math/files'), pattern: '*.woff2' },
    ],
    typescript: { tsConfig: { include: ['unit', 'reference', 'integration', 'api', 'e2e', 'oracle', 'factories'].map(kind => inRoot(`./tests/${kind}/**/*.ts`)).concat(inRoot('./scripts/**/*.ts')) } },
  },
  vite: {
    optimizeDeps: { include: ['@svgdotjs/svg.js', 'comlink', 'mathjs', 'papaparse'] },
    worker: { format: 'es' },
  },
  typescript: { strict: true },
  telemetry: false,
  auth: {
    // The 'authjs' provider pins a package with known holes; see DEVELOPERS.md on sign-in.
    provider: {
      type: 'local',
      endpoints: {
        signIn: { path: '/sign-in', method: 'post' },
        signOut: { path: '/sign-out', method: 'post' },
        getSession: { path: '/session', method: 'get' },
        signUp: false,
      },
      pages: { login: '/sign-in' },
      token: {
        signInResponseTokenPointer: '/token',
        cookieName: 'signed-in',
        maxAgeInSeconds: 12 * 60 * 60,
        sameSiteAttribute: 'lax',
        httpOnlyCookieAttribute: false,
      },
      session: {
        dataType: {
          person: 'import(\'#shared/types/person\').Person',
          memberships: 'import(\'#shared/types/person\').Membership[]',
        },
      },
    },
    globalAppMiddleware: { isEnabled: true, allow404WithoutAuth: true, addDefaultCallbackUrl: true },
    sessionRefresh: { enableOnWindowFocus: false },
  },
  eslint: { config: { stylistic: true } },
  security: {
    rateLimiter: false,
    requestSizeLimiter: false,
    // It would read every body before its route does, and refuse remarks that hold a '<'; bodies are read by schemas, pages escape.
    xssValidator: false,
    // Without it no other origin is allowed anything, which is the rule here.
    corsHandler: false,
    headers: {
      crossOriginEmbedderPolicy: false,
      strictTransportSecurity: { maxAge: 31_536_000, includeSubdomains: true },
      contentSecurityPolicy: {
        'script-src': ['\'self\'', '\'strict-dynamic\'', '\'nonce-{{nonce}}\''],
        'default-src': ['\'self\''],
        'img-src': ['\'self\'', 'data:'],
        'font-src': ['\'self\'', 'data:'],
        'style-src': ['\'self\'', '\'unsafe-inline\''],
        'worker-src': ['\'self\'', 'blob:'],
        'connect-src': ['\'self\''],
        'frame-ancestors': ['\'self\''],
        'upgrade-insecure-requests': false,
      },
    },
  },
  tailwindcss: { cssPath: '~/assets/css/main.css', viewer: false },
})
