// Who may use more than one thread.
#pragma once

namespace gapwright {

/// Threads that loops inside a single body may use on the calling thread: the program's choice, or
/// one inside a SerialRegion.
int inner_threads();
/// The program's choice; 0 or less: all cores.
void set_inner_threads(int count);

/// While it lives, loops inside bodies run serially on this thread: a sweep's tasks hold one, for
/// they are parallel across bodies and pairs already.
class SerialRegion {
 public:
  SerialRegion();
  ~SerialRegion();
  SerialRegion(const SerialRegion&) = delete;
  SerialRegion& operator=(const SerialRegion&) = delete;

 private:
  bool before_;
};

}  // namespace gapwright
