@echo off
rem Starts whither on Windows; builds it first with Maven if it is not built.
rem WHITHER_JAVA_OPTS holds options for the Java virtual machine, such as -Xmx8g.
setlocal
set "HERE=%~dp0"
if exist "%HERE%target\half-built" goto build
if not exist "%HERE%target\lib\" goto build
if exist "%HERE%target\whither.jar" goto start

:build
where mvn >nul 2>nul
if errorlevel 1 (
  echo whither: missing: Maven 3.6.3 or later, and a JDK, version 17 or later; install them and start again. 1>&2
  exit /b 3
)
echo whither: building the program; the first time, when libraries are fetched, this takes a minute or more 1>&2
if not exist "%HERE%target\" mkdir "%HERE%target"
type nul > "%HERE%target\half-built"
pushd "%HERE%.."
call mvn -B -ntp -q -Dmaven.test.skip=true package > "%HERE%target\build.log" 2>&1
if errorlevel 1 (
  popd
  type "%HERE%target\build.log" 1>&2
  echo whither: the build failed; what Maven said stands above 1>&2
  exit /b 1
)
popd
del "%HERE%target\half-built"

:start
set "JAVA=java"
if defined JAVA_HOME set "JAVA=%JAVA_HOME%\bin\java"
"%JAVA%" --enable-native-access=ALL-UNNAMED %WHITHER_JAVA_OPTS% -jar "%HERE%target\whither.jar" %*
exit /b %errorlevel%
