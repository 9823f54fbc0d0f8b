# Writes build_info.hpp with the version and the commit of the source; runs at every build, so that the commit a
# result names is the commit it was made with. The file is only touched when it changes.
# Needs: source, template, output, version.
set(commit "unknown")
set(git_here git -c "safe.directory=${source}" -C "${source}")
# A source tree unpacked inside some other repository must not take that repository's commit.
execute_process(COMMAND ${git_here} rev-parse --show-toplevel OUTPUT_VARIABLE top ERROR_QUIET
    OUTPUT_STRIP_TRAILING_WHITESPACE RESULT_VARIABLE status)
if(status STREQUAL "0" AND top STREQUAL source)
    execute_process(COMMAND ${git_here} rev-parse --short=12 HEAD OUTPUT_VARIABLE head ERROR_QUIET
        OUTPUT_STRIP_TRAILING_WHITESPACE RESULT_VARIABLE status)
    if(status STREQUAL "0")
        set(commit "${head}")
        execute_process(COMMAND ${git_here} status --porcelain --untracked-files=no OUTPUT_VARIABLE changes ERROR_QUIET)
        if(NOT changes STREQUAL "")
            string(APPEND commit "-dirty")
        endif()
    endif()
endif()
configure_file("${template}" "${output}" @ONLY)
