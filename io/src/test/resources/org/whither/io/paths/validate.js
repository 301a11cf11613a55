// Validates a glTF file with the Khronos validator, whose folder is the first argument, and prints what it finds.
const fs = require('fs');
const validator = require(process.argv[2]);
validator.validateBytes(new Uint8Array(fs.readFileSync(process.argv[3]))).then(report => {
  const found = report.issues;
  console.log(JSON.stringify(found.messages));
  process.exit(found.numErrors + found.numWarnings + found.numInfos + found.numHints === 0 ? 0 : 1);
});
