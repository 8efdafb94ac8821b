# Makes a C++ file out of files: cmake -DOUT=file.cpp -DFILES="path|type|file;..." -P embed.cmake
set(arrays "")
set(rows "")
set(number 0)
foreach(entry IN LISTS FILES)
  string(REPLACE "|" ";" parts "${entry}")
  list(GET parts 0 path)
  list(GET parts 1 type)
  list(GET parts 2 file)
  if(type MATCHES "^text/")
    set(type "${type};charset=utf-8")
  endif()
  file(READ "${file}" hex HEX)
  string(LENGTH "${hex}" length)
  math(EXPR length "${length} / 2")
  string(REGEX REPLACE "(..)" "\\\\x\\1" bytes "${hex}")
  # Pieces of 64 bytes a line: each is four characters of source.
  string(REGEX REPLACE "(................................................................................................................................................................................................................................................................)" "\\1\"\n    \"" bytes "${bytes}")
  string(APPEND arrays "constexpr char file_${number}[] =\n    \"${bytes}\";\n")
  string(APPEND rows "    {\"${path}\", \"${type}\", {file_${number}, ${length}}},\n")
  math(EXPR number "${number} + 1")
endforeach()
file(WRITE "${OUT}"
"// Made by embed.cmake from the page's files.
#include \"daemon/web/embedded.h\"

#include <array>

namespace lostwork {
namespace {

${arrays}
constexpr std::array<EmbeddedFile, ${number}> files{{
${rows}}};

}  // namespace

std::span<const EmbeddedFile> embedded_files() {
  return files;
}

}  // namespace lostwork
")
