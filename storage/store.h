// The one writer of a plant's database.
//
// All calls from one thread. Readers: history.h.
#pragma once

#include "storage/rows.h"
#include "thermo/reading.h"

#include <cstddef>
#include <cstdint>
#include <memory>
#include <string>
#include <string_view>

namespace lostwork {

// What a crash may take of batches that were acknowledged. A killed process never loses any.
enum class Durability : std::uint8_t {
  power_cut,  // nothing: each batch is on the disk before write() returns
  process     // a power cut may take the newest batches, never the file: for imports
};

struct StoreOptions {
  std::string file;  // made when missing
  Durability durability = Durability::power_cut;
  // Scans that wait in memory while the file cannot be written; beyond it the oldest are given up
  // and their time is recorded as a gap.
  std::size_t waiting_scans = 20000;
  std::size_t waiting_rows = 10000;  // the same for windows, findings and alarms, each
};

struct WriteResult {
  bool stored = false;            // everything given so far is in the file: acknowledged
  std::size_t waiting_scans = 0;  // still in memory; written with a later batch
  std::uint64_t given_up = 0;     // rows lost since the start because memory was full
  std::string why;                // one sentence where not stored: "plant.db: the disk is full"
};

class Store {
 public:
  // Opens or makes the file and brings an older schema up to date. Throws std::runtime_error with
  // one sentence that names the path and why: locked by another writer, of a later version, no
  // permission, not a database, not one of this program.
  explicit Store(const StoreOptions& options);
  Store(const Store&) = delete;
  Store& operator=(const Store&) = delete;
  ~Store();  // tries once more to write what waits

  // Stores the batch and whatever waits from before, in one transaction. Never throws for the
  // file's sake: on a full disk the rows wait in memory and go with the next call. Scans may come
  // late and in any order; times lie between 1970 and 2500, others are given up.
  WriteResult write(Batch batch);

  // Keeps the text of the plant file with its time, once for each change of the text. False where
  // the file could not be written: to be called again.
  bool keep_plant_file(std::string_view text, Instant time);

 private:
  class Implementation;
  std::unique_ptr<Implementation> implementation_;
};

}  // namespace lostwork
