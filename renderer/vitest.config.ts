import react from '@vitejs/plugin-react'
import { defineConfig } from 'vitest/config'

export default defineConfig({
  plugins: [react()],
  test: { name: 'renderer', include: ['**/*.test.ts', '**/*.test.tsx'], environment: 'happy-dom' },
})
