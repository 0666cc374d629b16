// Loaded into every process the scripts start: when the script that started it is gone, even by kill -9, the process
// stops itself, so that nothing is left behind holding ports and jobs.
if (process.channel) {
  process.once('disconnect', () => process.kill(process.pid, 'SIGTERM'));
  process.channel.unref();
}
