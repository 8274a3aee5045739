# Runs ${program}, built first by ${compiler} with ${flags} if those are given, and compares the
# lines it prints with the file ${golden}. ${plant} names a line to be falsified beforehand.

cmake_minimum_required(VERSION 3.20)

if(compiler)
    separate_arguments(flags UNIX_COMMAND "${flags}")
    file(GLOB sources "${root}/tests/digest/*.cpp")
    execute_process(
        COMMAND "${compiler}" -std=c++20 ${flags} "-I${root}/include" "-I${root}/tests" ${sources}
                -o "${program}"
        RESULT_VARIABLE status ERROR_VARIABLE text)
    if(NOT status EQUAL 0)
        message(FATAL_ERROR "does not compile:\n${text}")
    endif()
endif()

execute_process(COMMAND "${program}" RESULT_VARIABLE status OUTPUT_VARIABLE printed)
if(NOT status EQUAL 0)
    message(FATAL_ERROR "${program} ended with status ${status}")
endif()
file(READ "${golden}" expected)
if(plant)
    string(REGEX REPLACE "(${plant} +)[0-9a-f]+" "\\10" expected "${expected}")
endif()
if(printed STREQUAL expected)
    return()
endif()

# Which lines? Both ways, so that vanished and new ones are named as well.
string(REGEX REPLACE "\n$" "" printed "${printed}")
string(REGEX REPLACE "\n$" "" expected "${expected}")
string(REPLACE "\n" ";" printed "${printed}")
string(REPLACE "\n" ";" expected "${expected}")
set(faults "")
foreach(line IN LISTS printed)
    if(NOT line IN_LIST expected)
        string(REGEX REPLACE " +[0-9a-f]+$" "" what "${line}")
        string(REGEX REPLACE " +" " " what "${what}")
        string(APPEND faults "differs: ${what}\n")
    endif()
endforeach()
foreach(line IN LISTS expected)
    string(REGEX REPLACE " +[0-9a-f]+$" "" what "${line}")
    string(REGEX REPLACE " +" " +" pattern "${what}")
    if(NOT printed MATCHES "${pattern} ")
        string(APPEND faults "missing: ${what}\n")
    endif()
endforeach()
message(FATAL_ERROR
    "${faults}\n"
    "A line that is not yet in ${golden} may be added. A change of one that is there needs a new "
    "major version (promise P7); if only this build differs, promise P1 is broken.")
