#!/bin/sh
# Asked by the proxy (its address and port, then those of a node): succeeds where the node takes part in the head and has caught up.
exec /usr/bin/mariadb --no-defaults --host="$3" --port="$4" --user=look --connect-timeout=3 --init-command="SET SESSION wsrep_sync_wait = 0" --skip-column-names --batch \
  --execute="SELECT 1 / (COUNT(*) = 2) FROM information_schema.global_status
    WHERE (variable_name, variable_value) IN (('WSREP_READY', 'ON'), ('WSREP_LOCAL_STATE', '4'))" 2>/dev/null | grep -q '^1'
