// Loaded into every program that start runs: when start dies without a word, so do they.
process.once('disconnect', () => process.kill(process.pid, 'SIGTERM'));
process.channel?.unref();
