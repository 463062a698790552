// What a station's configuration may look like: it makes fixtures/wind_profile.cpp run, and is never shown to the analysis.
#pragma once
#define STATIONS 64
#define NETWORK_TOP(name) extern "C"
typedef float velocity_t;
