// Preloaded into every child: when the launcher is gone, even killed outright, the child ends too.
if (process.channel) {
  process.on('disconnect', () => {
    process.kill(process.pid, 'SIGTERM');
    setTimeout(() => process.exit(1), 10_000).unref();
  });
  process.channel.unref();
}
