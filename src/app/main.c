/* kentledge: surge, thrust and restraint of buried pressure mains. */
#include "kent_commands.h"

#include <errno.h>
#include <fcntl.h>
#include <locale.h>
#include <signal.h>
#include <stdio.h>
#include <stdlib.h>
#include <string.h>
#include <unistd.h>

/* A descriptor that the caller closed would go to the next file opened, and a report
 * would end up in a file of results. The wrong way round, so that its use is an error.
 */
static int hold_descriptors(void)
{
    for (int fd = STDIN_FILENO; fd <= STDERR_FILENO; fd++) {
        const int mode = fd == STDIN_FILENO ? O_WRONLY : O_RDONLY;
        if (fcntl(fd, F_GETFD) != -1 || errno != EBADF) continue;
        if (open("/dev/null", mode) != fd) return -1;
    }
    return 0;
}

/* --help and --version end in exit(): their text must have arrived too. */
static void close_output(void)
{
    if (fclose(stdout) == 0) return;
    (void)fprintf(stderr, "standard output: %s\n", strerror(errno));
    _exit(KENT_EXIT_FAILED);
}

int main(int argc, char **argv)
{
    kent_options options = {0};
    kent_exit code = KENT_EXIT_FAILED;
    (void)setlocale(LC_CTYPE, "");  /* names keep their accents; numbers their points */
    (void)signal(SIGPIPE, SIG_IGN); /* a closed pipe is a write error, status 1 */
    if (hold_descriptors() != 0 || atexit(close_output) != 0) return KENT_EXIT_FAILED;
    if (kent_options_read(argc, argv, &options) != 0) {
        (void)fprintf(stderr, "kentledge: out of memory\n");
    } else {
        code = kent_commands_do(&options);
    }
    kent_options_clear(&options);
    return (int)code;
}
