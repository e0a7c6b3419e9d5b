// Catch2 2.x has its main in the header; 3.x brings a library for it.
#define CATCH_CONFIG_MAIN
#include <catch2/catch.hpp>
