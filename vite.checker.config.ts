import { createHash } from 'node:crypto'
import { readFileSync } from 'node:fs'
import { join } from 'node:path'
import { defineConfig, type Plugin } from 'vite'

const folder = join(import.meta.dirname, 'src/features/ledger/checker')

/** Source of a content security policy that allows exactly this inline text. */
const hashOf = (text: string) => `'sha256-${createHash('sha256').update(text).digest('base64')}'`

/**
 * Turns the one script into the one HTML file: a classic inline script, since modules do not load from file://, and a policy that
 * allows that script and that style alone, and no network.
 */
function singlePage(): Plugin {
  return {
    name: 'single-page',
    generateBundle(_, bundle) {
      const chunks = Object.values(bundle).filter((output) => output.type === 'chunk')
      const [chunk, ...more] = chunks
      if (!chunk || more.length > 0) throw new Error('The checker must be one script.')
      const script = `\n${chunk.code.trim().replaceAll('</script', '<\\/script')}\n`
      const style = `\n${readFileSync(join(folder, 'checker.css'), 'utf8').trim()}\n`
      const policy = `default-src 'none'; script-src ${hashOf(script)}; style-src ${hashOf(style)}; base-uri 'none'; form-action 'none'`
      const page = readFileSync(join(folder, 'checker.html'), 'utf8')
        .replace('%POLICY%', () => policy)
        .replace(/<style>\s*%STYLE%;?\s*<\/style>/, () => `<style>${style}</style>`)
        .replace(/<script>\s*%SCRIPT%;?\s*<\/script>/, () => `<script>${script}</script>`)
      for (const name of Object.keys(bundle)) delete bundle[name]
      this.emitFile({ type: 'asset', fileName: 'check.html', source: page })
    },
  }
}

export default defineConfig({
  plugins: [singlePage()],
  publicDir: false,
  build: {
    outDir: 'dist',
    emptyOutDir: false,
    target: 'es2022',
    lib: {
      entry: join(folder, 'main.ts'),
      formats: ['iife'],
      name: 'halfsilverChecker',
      fileName: () => 'checker.js',
    },
  },
})
