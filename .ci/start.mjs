// npm start: install, build and serve the app, and print its address.
import { install, must, root } from './steps.mjs';

install();
must(process.execPath, ['.ci/build.mjs']);
const { preview } = await import('vite');
const port = process.env.PORT ? Number(process.env.PORT) : 4173;
const server = await preview({ root: `${root}app`, configFile: `${root}vite.config.ts`, preview: { port } });
console.log('\nDigit Assay is served at:');
server.printUrls();
console.log('Press Ctrl+C to stop.');
