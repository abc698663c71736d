import { defineConfig } from 'drizzle-kit'

/** `npx drizzle-kit generate` needs no database; nothing but migrations ever changes one. */
export default defineConfig({
  dialect: 'mysql',
  schema: './drizzle/schema/*.ts',
  out: './drizzle/migrations',
})
