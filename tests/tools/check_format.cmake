# Fails when a source is not as .clang-format says.
file(GLOB_RECURSE sources ${ROOT}/thermo/*.h ${ROOT}/thermo/*.cpp ${ROOT}/sensors/*.h ${ROOT}/sensors/*.cpp
  ${ROOT}/storage/*.h ${ROOT}/storage/*.cpp ${ROOT}/config/*.h ${ROOT}/config/*.cpp
  ${ROOT}/daemon/*.h ${ROOT}/daemon/*.cpp ${ROOT}/tests/*.h ${ROOT}/tests/*.cpp)
execute_process(COMMAND clang-format-14 --dry-run --Werror ${sources} RESULT_VARIABLE failed)
if(failed)
  message(FATAL_ERROR "run clang-format-14 -i on the files above")
endif()
