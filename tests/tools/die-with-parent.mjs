// Loaded into every helper process: ends it once the process that started it is gone, however that one ended.
const parent = process.ppid;
setInterval(() => {
  if (process.ppid !== parent) process.exit(143);
}, 500).unref();
