// Lets node run the server's TypeScript as it stands:
//
//   node -r ./docker-free-scripts/register.cjs server/main.ts
//
// The one .swcrc in the root serves here, in jest and in the production build, so that decorator metadata and
// the aliases `@/` and `@shared/` mean the same everywhere. (Without SWCRC the hook would read tsconfig.json of
// the current folder instead, and line numbers in stack traces come out wrong.)
const path = require('node:path');

process.env.SWCRC = 'true';
process.env.SWC_CONFIG_FILE = path.join(__dirname, '..', '.swcrc');
require('@swc-node/register');
