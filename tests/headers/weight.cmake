# Compile cost is a feature: no header of ${areas} (comma-separated) may pull in one of the standard headers ${heavy}
# (alternatives of a regular expression). Knows libstdc++'s folders only; elsewhere it finds nothing.

cmake_minimum_required(VERSION 3.20)

string(REPLACE "," ";" areas "${areas}")
set(seen 0)
set(faults "")
foreach(area IN LISTS areas)
    file(GLOB headers RELATIVE "${include_dir}" "${include_dir}/leat/${area}/*.hpp")
    list(FILTER headers EXCLUDE REGEX "with_boost_math\\.hpp$") # includes a library, on demand
    foreach(header IN LISTS headers)
        execute_process(
            COMMAND "${compiler}" -std=c++20 -M "-I${include_dir}" -x c++ "${include_dir}/${header}"
            OUTPUT_VARIABLE list RESULT_VARIABLE status ERROR_VARIABLE text)
        if(NOT status EQUAL 0)
            message(FATAL_ERROR "${header} does not compile:\n${text}")
        endif()
        math(EXPR seen "${seen} + 1")
        if(list MATCHES "/c\\+\\+/[0-9.]+/(${heavy})[ \n]")
            string(APPEND faults "${header} pulls in <${CMAKE_MATCH_1}>\n")
        endif()
    endforeach()
endforeach()
if(faults)
    message(FATAL_ERROR "${faults}")
endif()
if(seen EQUAL 0)
    message(FATAL_ERROR "no header was found under ${include_dir}: is this the right folder?")
endif()
