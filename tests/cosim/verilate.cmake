# Runs Verilator once and joins what it writes into a single source, whose name, unlike those of
# the parts, does not change with their content.
# Arguments: VERILATOR, OUTPUT (folder), PREFIX, TOP, RTL (folder), PARAMETERS (semicolon list)
file(REMOVE_RECURSE ${OUTPUT})
file(MAKE_DIRECTORY ${OUTPUT})
set(overrides)
foreach(parameter IN LISTS PARAMETERS)
  list(APPEND overrides -G${parameter})
endforeach()
execute_process(
  COMMAND ${VERILATOR} --cc -O3 --x-assign fast --x-initial fast --noassert -Wall -Werror-WIDTH
          --prefix ${PREFIX} --top-module ${TOP} ${overrides} --Mdir ${OUTPUT} -y ${RTL} ${RTL}/${TOP}.v
  COMMAND_ERROR_IS_FATAL ANY)
file(GLOB parts ${OUTPUT}/${PREFIX}*.cpp)
list(SORT parts)
set(text "")
foreach(part IN LISTS parts)
  string(APPEND text "#include \"${part}\"\n")
endforeach()
file(WRITE ${OUTPUT}/${PREFIX}.joined.cc "${text}")
