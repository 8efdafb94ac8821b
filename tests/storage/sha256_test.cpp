#include "storage/sha256.h"

#include <string>
#include <vector>

#include <gtest/gtest.h>

namespace lostwork {
namespace {

std::string hash_of(const std::string& text) {
  return hexadecimal(sha256(std::vector<std::uint8_t>{text.begin(), text.end()}));
}

// NIST, Secure Hash Standard, examples with intermediate values: SHA-256.
TEST(Sha256, OfOneBlockIsThatOfTheStandard) {
  EXPECT_EQ(hash_of("abc"), "ba7816bf8f01cfea414140de5dae2223b00361a396177a9cb410ff61f20015ad");
}
TEST(Sha256, OfTwoBlocksIsThatOfTheStandard) {
  EXPECT_EQ(hash_of("abcdbcdecdefdefgefghfghighijhijkijkljklmklmnlmnomnopnopq"),
            "248d6a61d20638b8e5c026930c3e6039a33ce45964ff2167f6ecedd419db06c1");
}
TEST(Sha256, OfNothingIsThatOfTheStandard) {
  EXPECT_EQ(hash_of(""), "e3b0c44298fc1c149afbf4c8996fb92427ae41e4649b934ca495991b7852b855");
}
TEST(Sha256, OfAMillionLettersIsThatOfTheStandard) {
  EXPECT_EQ(hash_of(std::string(1'000'000, 'a')),
            "cdc76e5c9914fb9281a1c7e284d73e67f1809a48a497200e046d39ccc7112cd0");
}

}  // namespace
}  // namespace lostwork
