// The page's files, made part of the program at build time (embed.cmake).
#pragma once

#include <span>
#include <string_view>

namespace lostwork {

struct EmbeddedFile {
  std::string_view path;  // "/style.css", as it is asked for
  std::string_view content_type;
  std::string_view content;
};
[[nodiscard]] std::span<const EmbeddedFile> embedded_files();

}  // namespace lostwork
