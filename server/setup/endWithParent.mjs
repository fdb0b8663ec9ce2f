/** Loaded first into every process that set-up starts and watches over: where set-up dies, however it dies, the process ends too. */
if (process.channel) {
  process.once('disconnect', () => process.kill(process.pid, 'SIGTERM'))
  process.channel.unref()
}
