// Runs on any Node, so that an old one is told what is wanted: nothing is imported before the check.
const wanted = [20, 19];
const found = process.versions.node.split('.').map(Number);
if (found[0] !== wanted[0] || found[1] < wanted[1]) {
  console.error(
    `Tagwire needs Node.js ${wanted.join('.')} or a later 20; this is ${process.version}.`,
  );
  console.error('Install Node.js 20 (for example: nvm install 20), then run again.');
  process.exit(1);
}
import('./product/main.mjs').then((main) => main.start(process.argv.slice(2)));
