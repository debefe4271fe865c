// Preloaded into a server that another process watches over: when the watcher is killed without a chance
// to stop its server, the server ends by itself instead of keeping the port.
if (process.channel) {
  process.on('disconnect', () => process.kill(process.pid, 'SIGTERM'))
  process.channel.unref()
}
