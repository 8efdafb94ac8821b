// Runs a fuzz target over the files of a stored corpus: its main() where libFuzzer is not linked.
#include <cstddef>
#include <cstdint>
#include <cstdio>
#include <filesystem>
#include <fstream>
#include <iterator>
#include <vector>

extern "C" int LLVMFuzzerTestOneInput(const std::uint8_t* bytes, std::size_t size);

int main(int argc, char** argv) {
  std::size_t runs = 0;
  for (int i = 1; i < argc; ++i) {
    for (const auto& entry : std::filesystem::directory_iterator{argv[i]}) {
      std::ifstream file{entry.path(), std::ios::binary};
      const std::vector<char> text{std::istreambuf_iterator<char>{file}, {}};
      const std::vector<std::uint8_t> bytes{text.begin(), text.end()};
      LLVMFuzzerTestOneInput(bytes.data(), bytes.size());
      ++runs;
    }
  }
  std::printf("%zu inputs\n", runs);
  return runs > 0 ? 0 : 1;
}
