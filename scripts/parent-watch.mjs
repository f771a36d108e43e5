// Loaded into a child with --import: the child ends when the process that started it is gone, even if that one was killed outright.
const parent = process.ppid;

setInterval(() => {
  if (process.ppid !== parent) process.kill(process.pid, "SIGTERM");
}, 1_000).unref();
