// A folder for one test, gone with it.
#pragma once

#include <filesystem>
#include <fstream>
#include <sstream>
#include <stdexcept>
#include <stdlib.h>  // NOLINT(modernize-deprecated-headers): mkdtemp is POSIX, not ISO C
#include <string>
#include <string_view>

namespace lostwork {

class TestFolder {
 public:
  TestFolder() {
    std::string name = (std::filesystem::temp_directory_path() / "lostwork-test-XXXXXX").string();
    if (mkdtemp(name.data()) == nullptr) {
      throw std::runtime_error{"no folder for the test: " + name};
    }
    path_ = name;
  }
  TestFolder(const TestFolder&) = delete;
  TestFolder& operator=(const TestFolder&) = delete;
  ~TestFolder() { std::filesystem::remove_all(path_); }

  [[nodiscard]] std::filesystem::path operator/(std::string_view name) const {
    return path_ / name;
  }

  // Writes a file and gives its path.
  [[nodiscard]] std::string file(std::string_view name, std::string_view text) const {
    const std::filesystem::path path = path_ / name;
    std::ofstream{path} << text;
    return path.string();
  }

 private:
  std::filesystem::path path_;
};

[[nodiscard]] inline std::string text_of(const std::filesystem::path& path) {
  std::ostringstream out;
  out << std::ifstream{path}.rdbuf();
  return out.str();
}

}  // namespace lostwork
