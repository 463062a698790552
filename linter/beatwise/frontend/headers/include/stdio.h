#pragma once
#include <stdarg.h>
#include <stddef.h>
typedef struct _BwFile FILE;
extern FILE *stdin, *stdout, *stderr;
#define EOF (-1)
#define SEEK_SET 0
#define SEEK_CUR 1
#define SEEK_END 2
#define BUFSIZ 8192
int printf(const char *, ...);
int fprintf(FILE *, const char *, ...);
int sprintf(char *, const char *, ...);
int snprintf(char *, size_t, const char *, ...);
int vprintf(const char *, va_list);
int vfprintf(FILE *, const char *, va_list);
int vsnprintf(char *, size_t, const char *, va_list);
int scanf(const char *, ...);
int fscanf(FILE *, const char *, ...);
int sscanf(const char *, const char *, ...);
FILE *fopen(const char *, const char *);
int fclose(FILE *);
int fflush(FILE *);
size_t fread(void *, size_t, size_t, FILE *);
size_t fwrite(const void *, size_t, size_t, FILE *);
int fseek(FILE *, long, int);
long ftell(FILE *);
void rewind(FILE *);
int feof(FILE *);
int ferror(FILE *);
int fgetc(FILE *);
int fputc(int, FILE *);
int getc(FILE *);
int putc(int, FILE *);
int getchar();
int putchar(int);
char *fgets(char *, int, FILE *);
int fputs(const char *, FILE *);
int puts(const char *);
void perror(const char *);
int remove(const char *);
int rename(const char *, const char *);
namespace std {
using ::FILE; using ::printf; using ::fprintf; using ::sprintf; using ::snprintf; using ::vprintf; using ::vfprintf; using ::vsnprintf;
using ::scanf; using ::fscanf; using ::sscanf; using ::fopen; using ::fclose; using ::fflush; using ::fread; using ::fwrite;
using ::fseek; using ::ftell; using ::rewind; using ::feof; using ::ferror; using ::fgetc; using ::fputc; using ::getc; using ::putc;
using ::getchar; using ::putchar; using ::fgets; using ::fputs; using ::puts; using ::perror; using ::remove; using ::rename;
}
