# Compiles ${file} as it is, which must succeed, then every case of it that must be refused.
# The form of a case is described in CMakeLists.txt.

cmake_minimum_required(VERSION 3.20)

set(ENV{LC_ALL} C) # compilers' quotation marks follow the locale

function(compile flags status text)
    separate_arguments(flags UNIX_COMMAND "${flags}")
    execute_process(
        COMMAND "${compiler}" -std=c++20 -fsyntax-only "-I${include_dir}" ${flags} "${file}"
        RESULT_VARIABLE result OUTPUT_VARIABLE printed ERROR_VARIABLE printed)
    set(${status} "${result}" PARENT_SCOPE)
    set(${text} "${printed}" PARENT_SCOPE)
endfunction()

compile("" status text)
if(NOT status EQUAL 0)
    message(FATAL_ERROR "${file}: the twins must compile:\n${text}")
endif()

set(listed "")
file(STRINGS "${file}" cases REGEX "^// refused [0-9]+")
foreach(case IN LISTS cases)
    if(NOT case MATCHES "^// refused ([0-9]+)( \\(([a-z+]+)([^)]*)\\))?: (.+)$")
        message(FATAL_ERROR "${file}: cannot read \"${case}\"")
    endif()
    set(number "${CMAKE_MATCH_1}")
    list(APPEND listed "${number}")
    set(only "${CMAKE_MATCH_3}")
    set(flags "${CMAKE_MATCH_4}")
    set(expected "${CMAKE_MATCH_5}")
    if((only STREQUAL "g++" AND NOT compiler_id STREQUAL "GNU")
       OR (only STREQUAL "clang++" AND NOT compiler_id MATCHES "Clang"))
        continue()
    endif()
    compile("-DREFUSED=${number} ${flags}" status text)
    if(status EQUAL 0)
        message(FATAL_ERROR "${file}: case ${number} must not compile (${flags})")
    endif()
    string(FIND "${text}" "${expected}" at)
    if(at EQUAL -1)
        message(FATAL_ERROR
            "${file}: case ${number} was refused, but not with \"${expected}\":\n${text}")
    endif()
endforeach()

# A case without a line, lost perhaps where a formatter joined two comments, would not be tried.
file(STRINGS "${file}" blocks REGEX "REFUSED == [0-9]+")
list(REMOVE_DUPLICATES listed)
list(LENGTH listed lines)
list(LENGTH blocks written)
if(lines LESS written OR lines EQUAL 0)
    message(FATAL_ERROR "${file}: ${written} cases are written, ${lines} are listed on top")
endif()
