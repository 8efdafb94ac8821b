// Makes sure that one program writes a database: a lock on a file beside it.
//
// SQLite's own locks last for a transaction only, and a second writer between two of them would go
// unnoticed. A file of its own, because closing any descriptor of the database's file would drop
// SQLite's locks.
#pragma once

#include <string>

namespace lostwork {

// Held until destroyed; a killed process lets go of it too.
class WriterLock {
 public:
  // Locks FILE-writer. Throws std::runtime_error with one sentence: held by another process, or the
  // folder may not be written.
  explicit WriterLock(const std::string& file);
  WriterLock(const WriterLock&) = delete;
  WriterLock& operator=(const WriterLock&) = delete;
  ~WriterLock();

 private:
  int descriptor_ = -1;
};

}  // namespace lostwork
