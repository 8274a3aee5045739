# Two programs of one study: leat_skerry_bank on the threads of one machine, leat_skerry_bank_mpi on
# the ranks of MPI. What is not found is left out, unless it was asked for.

find_package(OpenMP QUIET COMPONENTS CXX)
find_package(TBB QUIET CONFIG)
set(MPI_CXX_SKIP_MPICXX ON) # the C interface alone
find_package(MPI QUIET COMPONENTS CXX)

option(LEAT_EXAMPLES_WITH_OPENMP "Build the study's driver for OpenMP" "${OpenMP_CXX_FOUND}")
option(LEAT_EXAMPLES_WITH_TBB "Build the study's driver for std::execution" "${TBB_FOUND}")
option(LEAT_EXAMPLES_WITH_MPI "Build the study's program for MPI" "${MPI_CXX_FOUND}")
foreach(pair IN ITEMS OPENMP:OpenMP::OpenMP_CXX TBB:TBB::tbb MPI:MPI::MPI_CXX)
    string(REGEX MATCH "^([A-Z]+):(.*)$" pair "${pair}")
    if(LEAT_EXAMPLES_WITH_${CMAKE_MATCH_1} AND NOT TARGET ${CMAKE_MATCH_2})
        message(FATAL_ERROR "leat: LEAT_EXAMPLES_WITH_${CMAKE_MATCH_1} is on, but there is no "
                            "${CMAKE_MATCH_2}: install it, or switch the option off")
    endif()
endforeach()

# All but the drivers and main.
file(GLOB study_files CONFIGURE_DEPENDS "${CMAKE_CURRENT_LIST_DIR}/*.cpp")
list(REMOVE_ITEM study_files "${CMAKE_CURRENT_LIST_DIR}/main.cpp")
add_library(leat_skerry_bank_study STATIC ${study_files})
target_link_libraries(leat_skerry_bank_study PUBLIC
    leat_own nlohmann_json::nlohmann_json Threads::Threads)
target_compile_definitions(leat_skerry_bank_study PUBLIC
    "LEAT_SKERRY_BANK_DIR=\"${CMAKE_CURRENT_LIST_DIR}\"")

set(drivers "${CMAKE_CURRENT_LIST_DIR}/drivers")
add_library(leat_skerry_bank_drivers STATIC "${drivers}/drivers.cpp" "${drivers}/jthread.cpp")
target_link_libraries(leat_skerry_bank_drivers PUBLIC leat_skerry_bank_study)
if(LEAT_EXAMPLES_WITH_OPENMP)
    target_sources(leat_skerry_bank_drivers PRIVATE "${drivers}/openmp.cpp")
    target_compile_definitions(leat_skerry_bank_drivers PRIVATE SKERRY_BANK_WITH_OPENMP=1)
    target_link_libraries(leat_skerry_bank_drivers PRIVATE OpenMP::OpenMP_CXX)
endif()
if(LEAT_EXAMPLES_WITH_TBB)
    target_sources(leat_skerry_bank_drivers PRIVATE "${drivers}/tbb.cpp")
    target_compile_definitions(leat_skerry_bank_drivers PRIVATE SKERRY_BANK_WITH_TBB=1)
    target_link_libraries(leat_skerry_bank_drivers PRIVATE TBB::tbb)
endif()

add_executable(leat_skerry_bank "${CMAKE_CURRENT_LIST_DIR}/main.cpp")
target_link_libraries(leat_skerry_bank PRIVATE leat_skerry_bank_drivers)
if(LEAT_EXAMPLES_WITH_MPI)
    add_executable(leat_skerry_bank_mpi "${drivers}/mpi_main.cpp" "${drivers}/mpi.cpp")
    target_link_libraries(leat_skerry_bank_mpi PRIVATE leat_skerry_bank_study MPI::MPI_CXX)
endif()
