# Makes OUT, a C++ source, of the numbered files that SCRIPTS lists, separated by commas.
cmake_policy(VERSION 3.25)
string(REPLACE "," ";" scripts "${SCRIPTS}")
set(rows "")
foreach(script IN LISTS scripts)
  file(READ "${script}" sql)
  string(APPEND rows "    R\"sql(${sql})sql\",\n")
endforeach()
file(WRITE "${OUT}" "// Made of storage/schema/*.sql by embed.cmake.
#include \"storage/schema.h\"

#include <array>

namespace lostwork {
namespace {
constexpr auto scripts = std::to_array<std::string_view>({
${rows}});
}  // namespace

std::span<const std::string_view> schema_scripts() {
  return scripts;
}

}  // namespace lostwork
")
