import tailwindcss from "@tailwindcss/vite";
import react from "@vitejs/plugin-react";
import { defineConfig } from "vite";

const apiPort = process.env.API_PORT ?? "4181";

export default defineConfig({
  plugins: [react(), tailwindcss()],
  build: { outDir: "dist/client", assetsInlineLimit: 0, sourcemap: false },
  server: { host: "127.0.0.1", proxy: { "/api": `http://127.0.0.1:${apiPort}` } },
});
