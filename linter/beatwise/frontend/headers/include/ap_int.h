#pragma once
#include <_bw/integer.h>
#include <math.h>
#include <stdint.h>
#include <iostream>
#include <stdlib.h>
#include <string.h>
