import { defineConfig } from 'vitest/config'
export default defineConfig({ root: '/work/main', test: { include: ['tests/http/{sessions,sign-in,guards,queue,object-store,mail}.test.ts'], globalSetup: ['/tmp/vt-setup.ts'], fileParallelism: false, testTimeout: 60000, hookTimeout: 120000 } })
