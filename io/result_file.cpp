#include "io/result_file.hpp"
