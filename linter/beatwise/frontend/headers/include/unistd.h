#pragma once
#include <stddef.h>
unsigned sleep(unsigned);
int usleep(unsigned);
int close(int);
ssize_t read(int, void *, size_t);
ssize_t write(int, const void *, size_t);
int access(const char *, int);
int getopt(int, char *const *, const char *);
extern char *optarg;
extern int optind;
long sysconf(int);
int getpid();
