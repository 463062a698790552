#pragma once
#include <stddef.h>
void *memcpy(void *_BwTo, const void *_BwFrom, size_t _BwBytes);
void *memmove(void *_BwTo, const void *_BwFrom, size_t _BwBytes);
void *memset(void *_BwTo, int _BwByte, size_t _BwBytes);
int memcmp(const void *_BwA, const void *_BwB, size_t _BwBytes);
void *memchr(const void *_BwIn, int _BwByte, size_t _BwBytes);
char *strcpy(char *_BwTo, const char *_BwFrom);
char *strncpy(char *_BwTo, const char *_BwFrom, size_t _BwCount);
char *strcat(char *_BwTo, const char *_BwFrom);
char *strncat(char *_BwTo, const char *_BwFrom, size_t _BwCount);
int strcmp(const char *_BwA, const char *_BwB);
int strncmp(const char *_BwA, const char *_BwB, size_t _BwCount);
int strcasecmp(const char *_BwA, const char *_BwB);
int strncasecmp(const char *_BwA, const char *_BwB, size_t _BwCount);
size_t strlen(const char *_BwText);
size_t strspn(const char *_BwText, const char *_BwSet);
size_t strcspn(const char *_BwText, const char *_BwSet);
const char *strchr(const char *_BwText, int _BwChar);
char *strchr(char *_BwText, int _BwChar);
const char *strrchr(const char *_BwText, int _BwChar);
char *strrchr(char *_BwText, int _BwChar);
const char *strstr(const char *_BwText, const char *_BwPart);
char *strstr(char *_BwText, const char *_BwPart);
char *strtok(char *_BwText, const char *_BwSet);
char *strdup(const char *_BwText);
char *strerror(int _BwCode);
void bzero(void *_BwTo, size_t _BwBytes);
void bcopy(const void *_BwFrom, void *_BwTo, size_t _BwBytes);
namespace std {
using ::memcpy; using ::memmove; using ::memset; using ::memcmp; using ::memchr;
using ::strcpy; using ::strncpy; using ::strcat; using ::strncat; using ::strcmp; using ::strncmp; using ::strlen;
using ::strspn; using ::strcspn; using ::strchr; using ::strrchr; using ::strstr; using ::strtok; using ::strerror;
}
