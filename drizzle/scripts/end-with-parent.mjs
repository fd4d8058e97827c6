// @ts-check
// Loaded into the app server by `--import`: when the program that started it is gone, even by kill -9, the server ends too
// and does not hold its port for ever. The channel to the parent closes by itself in that case.
process.on('disconnect', () => {
  process.kill(process.pid, 'SIGTERM')
})
process.channel?.unref()
