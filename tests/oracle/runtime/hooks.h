// What the harness and the stand-in headers may say to the hooks.
#pragma once
#include <cstddef>
#include <cstdint>

void oracle_watch(const void* start, size_t bytes);                  // the next kernel argument's memory
void oracle_start(const char* user_code_file);                       // lines "low high": addresses of user code, hex
void oracle_finish(const char* event_file);
void oracle_request(const void* start, size_t bytes, bool store);    // an explicit burst request
