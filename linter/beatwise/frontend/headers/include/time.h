#pragma once
#include <stddef.h>
typedef long time_t;
typedef long clock_t;
typedef int clockid_t;
struct tm { int tm_sec, tm_min, tm_hour, tm_mday, tm_mon, tm_year, tm_wday, tm_yday, tm_isdst; };
struct timespec { time_t tv_sec; long tv_nsec; };
struct timeval { time_t tv_sec; long tv_usec; };
#define CLOCKS_PER_SEC 1000000L
#define CLOCK_REALTIME 0
#define CLOCK_MONOTONIC 1
time_t time(time_t *);
clock_t clock();
double difftime(time_t, time_t);
int clock_gettime(clockid_t, struct timespec *);
int nanosleep(const struct timespec *, struct timespec *);
int gettimeofday(struct timeval *, void *);
struct tm *localtime(const time_t *);
char *ctime(const time_t *);
size_t strftime(char *, size_t, const char *, const struct tm *);
namespace std { using ::time; using ::clock; using ::time_t; using ::clock_t; using ::difftime; using ::tm; using ::localtime; using ::ctime; using ::strftime; }
