// Boost.JSON, compiled here once: its Debian package brings no library for this version.
#include <boost/json/src.hpp>
