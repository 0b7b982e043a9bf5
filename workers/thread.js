// The entry of a worker thread. Plain JavaScript, because Node starts it before anything can read TypeScript.
require('tsx/cjs');
module.exports = require('./threadTasks.ts');
