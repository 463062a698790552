#pragma once
int isalpha(int); int isdigit(int); int isalnum(int); int isspace(int); int isupper(int); int islower(int);
int isxdigit(int); int ispunct(int); int isprint(int); int iscntrl(int); int isgraph(int); int isblank(int);
int toupper(int); int tolower(int);
namespace std {
using ::isalpha; using ::isdigit; using ::isalnum; using ::isspace; using ::isupper; using ::islower; using ::isxdigit;
using ::ispunct; using ::isprint; using ::iscntrl; using ::isgraph; using ::isblank; using ::toupper; using ::tolower;
}
