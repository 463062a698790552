#pragma once
#define __bool_true_false_are_defined 1
