# Uses leat from another project by ${route}, in the folder ${work}, and runs what was built.

cmake_minimum_required(VERSION 3.20)

function(run)
    execute_process(COMMAND ${ARGN} RESULT_VARIABLE status OUTPUT_VARIABLE text ERROR_VARIABLE text)
    if(NOT status EQUAL 0)
        list(JOIN ARGN " " command)
        message(FATAL_ERROR "status ${status} from: ${command}\n${text}")
    endif()
    set(printed "${text}" PARENT_SCOPE)
endfunction()

# The command must fail and say TEXT, in however many lines.
function(refused text)
    execute_process(COMMAND ${ARGN} RESULT_VARIABLE status OUTPUT_VARIABLE said ERROR_VARIABLE said)
    string(REGEX REPLACE "[ \n]+" " " said "${said}")
    string(FIND "${said}" "${text}" place)
    if(status EQUAL 0 OR place EQUAL -1)
        list(JOIN ARGN " " command)
        message(FATAL_ERROR "not refused with \"${text}\" (status ${status}): ${command}\n${said}")
    endif()
endfunction()

# A program that was built says the version and the digits that a stream gives everywhere.
function(check_program)
    run("${work}/consumer")
    string(STRIP "${printed}" printed)
    if(NOT printed STREQUAL version)
        message(FATAL_ERROR "the program printed \"${printed}\", expected \"${version}\"")
    endif()
endfunction()

set(here "${CMAKE_CURRENT_LIST_DIR}")
set(common -G "${generator}" -D "CMAKE_CXX_COMPILER=${compiler}")
file(REMOVE_RECURSE "${work}")
file(MAKE_DIRECTORY "${work}")

# ---- The package, moved after its installation: no path of the first place may be left in it ----

if(route STREQUAL "install")
    run("${CMAKE_COMMAND}" -S "${leat}" -B "${work}/leat" ${common} -D LEAT_BUILD_TESTS=OFF
        -D LEAT_BUILD_EXAMPLES=OFF -D "CMAKE_INSTALL_PREFIX=${work}/first")
    run("${CMAKE_COMMAND}" --install "${work}/leat")
    file(REMOVE_RECURSE "${prefix}")
    file(RENAME "${work}/first" "${prefix}")
    file(GLOB_RECURSE files "${prefix}/share/*")
    foreach(file IN LISTS files)
        file(READ "${file}" text)
        string(FIND "${text}" "${work}" built)
        string(FIND "${text}" "${leat}" source)
        if(NOT "${built},${source}" STREQUAL "-1,-1")
            message(FATAL_ERROR "an absolute path is left in ${file}:\n${text}")
        endif()
    endforeach()

# ---- Which versions are found, and what is refused ----

elseif(route STREQUAL "finding")
    set(find "${CMAKE_COMMAND}" -S "${here}/finding" -G "${generator}"
        -D "CMAKE_PREFIX_PATH=${prefix}" -D "version=${version}")
    run(${find} -B "${work}/versions")
    refused("requested version \"99.0\"" ${find} -B "${work}/99" -D wanted=99.0)
    refused("there is no component \"xml\"; the one there is: json"
            ${find} -B "${work}/xml" -D component=xml)
    refused("the component json needs nlohmann_json, which was not found"
            ${find} -B "${work}/json" -D component=json
            -D CMAKE_DISABLE_FIND_PACKAGE_nlohmann_json=ON)

# ---- pkg-config: one flag, no library; two files, compiled and linked by hand ----

elseif(route STREQUAL "pkgconfig")
    set(ENV{PKG_CONFIG_PATH} "${prefix}/share/pkgconfig")
    run("${pkg_config}" --modversion leat)
    string(STRIP "${printed}" printed)
    if(NOT printed STREQUAL version)
        message(FATAL_ERROR "pkg-config says version ${printed}, not ${version}")
    endif()
    refused("99" "${pkg_config}" --print-errors "leat >= 99")
    run("${pkg_config}" --libs leat)
    string(STRIP "${printed}" printed)
    if(NOT printed STREQUAL "")
        message(FATAL_ERROR "pkg-config names a library: ${printed}")
    endif()
    run("${pkg_config}" --cflags leat)
    separate_arguments(printed UNIX_COMMAND "${printed}")
    if(NOT printed STREQUAL "-I${prefix}/share/pkgconfig/../../include")
        message(FATAL_ERROR "more or less than the include folder: ${printed}")
    endif()
    run("${compiler}" -std=c++20 ${flags} "${printed}" "${here}/project/main.cpp"
        "${here}/project/other.cpp" -o "${work}/consumer")
    check_program()

elseif(route STREQUAL "libcxx_runs")
    run("${compiler}" -std=c++2b -stdlib=libc++ ${flags} "-I${prefix}/include"
        "${here}/project/main.cpp" "${here}/project/other.cpp" -o "${work}/consumer")
    check_program()

# ---- CMake ----

else()
    set(project project)
    if(route STREQUAL "json")
        set(project json)
    endif()
    run("${CMAKE_COMMAND}" -S "${here}/${project}" -B "${work}" ${common} -D "route=${route}"
        -D "leat=${leat}" -D "CMAKE_PREFIX_PATH=${prefix}" -D "wanted=${version}"
        -D "flags=${flags}")
    run("${CMAKE_COMMAND}" --build "${work}")
    check_program()
endif()
