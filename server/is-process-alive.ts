/** Whether a process of this number runs on this machine. */
export function isProcessAlive(pid: number): boolean {
  try {
    process.kill(pid, 0);
    return true;
  } catch (error) {
    // A process of another user is alive, too.
    return (error as NodeJS.ErrnoException).code === 'EPERM';
  }
}
