#pragma once
#include <_bw/fixed.h>
#include <ap_int.h>
