# Sourced by db.sh and the scripts: which TCP ports are taken on this machine.

port_taken() { # looks for a listening socket in the kernel's table, IPv4 and IPv6
  cat /proc/net/tcp /proc/net/tcp6 2>/dev/null | grep -qi ":$(printf '%04x' "$1") [0-9a-f]*:0000 0a"
}

free_port() { # prints the first free port of the 200 from $1 on; fails if there is none
  candidate=$1
  while port_taken "$candidate"; do
    candidate=$((candidate + 1))
    [ "$candidate" -lt $(($1 + 200)) ] || return 1
  done
  printf '%s' "$candidate"
}
